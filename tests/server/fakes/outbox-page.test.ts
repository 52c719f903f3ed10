// @vitest-environment jsdom
import { expect, test } from 'vitest';
import { outboxPage } from '#server/fakes/outbox-page.ts';
import type { Mail } from '#server/fakes/mail.ts';

const mail: Mail = {
  to: ['noor@orchard-lane.example'],
  from: 'no-reply@espalier.example',
  subject: 'Something new in Espalier',
  text: 'Open Espalier to read it:\nhttp://localhost:4600/round.\n',
  html: null,
  at: '2026-03-02T08:15:30.120Z',
};

const parse = (mails: Mail[]): Document => new DOMParser().parseFromString(outboxPage(mails), 'text/html');

test('with no mail yet the page says so', () => {
  const page = parse([]);
  expect(page.querySelector('main')?.textContent).toContain('Nothing has been sent yet.');
  expect(page.querySelector('ol')).toBeNull();
});

test('each mail shows its subject, people and moment, in the order given', () => {
  const page = parse([mail, { ...mail, subject: '', at: '2026-03-01T23:59:59.000Z' }]);
  const items = [...page.querySelectorAll('ol > li')];
  expect(items.map((item) => item.querySelector('h2')?.textContent)).toEqual([
    'Something new in Espalier',
    '(no subject)',
  ]);
  expect(items.map((item) => item.querySelector('time')?.textContent)).toEqual([
    '2026-03-02 08:15:30 UTC',
    '2026-03-01 23:59:59 UTC',
  ]);
  expect(items[0]?.textContent).toContain('noor@orchard-lane.example');
});

test('an address in a mail can be followed, without the full stop after it', () => {
  const links = [...parse([mail]).querySelectorAll('li a')].map((link) => link.getAttribute('href'));
  expect(links).toEqual(['http://localhost:4600/round']);
});

test('what a mail says is text, never markup', () => {
  const hostile = '<img src=x onerror=alert(1)>&amp;"\'https://a.example/?a=1&b="><script>';
  const page = parse([
    { ...mail, subject: hostile, from: hostile, to: [hostile], text: hostile, at: hostile },
  ]);
  expect(page.querySelector('img, script, [onerror]')).toBeNull();
  expect(page.querySelector('h2')?.textContent).toBe(hostile);
  expect(page.querySelector('pre')?.textContent).toBe(hostile);
});

test('the page keeps to the content policy and has a language, a title, one main and one first heading', () => {
  const page = parse([mail]);
  expect(page.querySelectorAll('script, [style], link')).toHaveLength(0);
  expect(page.querySelectorAll('style')).toHaveLength(1);
  expect(page.documentElement.lang).toBe('en');
  expect(page.title).toBe('Outbox · Espalier demo');
  expect(page.querySelectorAll('main, h1')).toHaveLength(2);
});
