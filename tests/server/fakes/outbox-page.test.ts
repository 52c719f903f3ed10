// @vitest-environment jsdom
import { expect, test } from 'vitest';
import { outboxPage, type OutboxContent } from '#server/fakes/outbox-page.ts';
import type { Sent, SentCall, SentMail, SentPush, SentSms } from '#server/fakes/sent.ts';

const at = '2026-03-02T08:15:30.120Z';
const mail: SentMail = {
  ...{ kind: 'mail', id: 'mail-1', at },
  to: ['noor@orchard-lane.example'],
  from: 'no-reply@espalier.example',
  subject: 'Something new in Espalier',
  text: 'Open Espalier to read it:\nhttp://localhost:4600/round.\n',
  html: null,
};
const push: SentPush = {
  ...{ kind: 'push', id: 'push-1', at, deviceId: 'device-1', urgency: 'high', topic: 'abc', ttl: 3_600 },
  payload: JSON.stringify({ title: 'Espalier', body: 'A flag is waiting.', path: '/round' }),
};
const call: SentCall = {
  ...{ kind: 'call', id: 'CA0123', at, to: '+12025550111', from: '+12025550100', state: 'ringing' },
  spoken: ['A page is waiting. Press 1 to say that you have heard this.'],
  keysUrl: 'http://localhost:4600/gateway/calls/a/b/keys',
  statusUrl: 'http://localhost:4600/gateway/calls/a/b/status',
};
const sms: SentSms = {
  ...{ kind: 'sms', id: 'SM0123', at, to: '+12025550111', from: '+12025550100' },
  text: 'A page is waiting. http://localhost:4600/sign-in',
};

const parse = (sent: Sent[], over: Partial<OutboxContent> = {}): Document =>
  new DOMParser().parseFromString(outboxPage({ sent, kind: null, codes: [], ...over }), 'text/html');

const items = (page: Document) => [...page.querySelectorAll('ol > li')];

test('with nothing sent yet the page says so', () => {
  const page = parse([]);
  expect(page.querySelector('main')?.textContent).toContain('Nothing has been sent yet.');
  expect(page.querySelector('ol')).toBeNull();
});

test('each mail shows its subject, people and moment, in the order given', () => {
  const page = parse([mail, { ...mail, subject: '', at: '2026-03-01T23:59:59.000Z' }]);
  expect(items(page).map((item) => item.querySelector('h3')?.textContent)).toEqual([
    'Something new in Espalier',
    '(no subject)',
  ]);
  expect(items(page).map((item) => item.querySelector('time')?.textContent)).toEqual([
    '2026-03-02 08:15:30 UTC',
    '2026-03-01 23:59:59 UTC',
  ]);
  expect(items(page)[0]?.textContent).toContain('noor@orchard-lane.example');
});

test('mails, pushes, calls and SMS stand in one list, and one kind alone when it is asked for', () => {
  const all = [sms, call, push, mail];
  const kinds = (page: Document) => items(page).map((item) => item.querySelector('.kind')?.textContent);
  expect(kinds(parse(all))).toEqual(['SMS', 'Telephone call', 'Push', 'Mail']);
  const pushes = parse(all, { kind: 'push' });
  expect(kinds(pushes)).toEqual(['Push']);
  expect(pushes.querySelector('nav a[aria-current="page"]')?.getAttribute('href')).toBe('/outbox?kind=push');
  expect([...pushes.querySelectorAll('nav a')].map((link) => link.getAttribute('href'))).toEqual([
    ...['/outbox', '/outbox?kind=mail', '/outbox?kind=push', '/outbox?kind=call', '/outbox?kind=sms'],
  ]);
});

test('a push shows what its device reads, and leads where a click on it would', () => {
  const page = parse([push]);
  expect(items(page)[0]?.textContent).toContain('A flag is waiting.');
  expect(page.querySelector('li p a')?.getAttribute('href')).toBe('/round');
  expect(items(parse([{ ...push, payload: null, deviceId: null }]))[0]?.textContent).toContain(
    'It is encrypted for that browser alone and cannot be shown here.',
  );
  for (const path of [
    'https://elsewhere.example/',
    '//elsewhere.example/',
    '/\\elsewhere.example',
    'javascript:1',
  ]) {
    const payload = JSON.stringify({ title: 'Espalier', body: 'x', path });
    expect(parse([{ ...push, payload }]).querySelector('ol a'), path).toBeNull();
  }
});

test('a call that rings can be answered by the key or let ring out, and one that is over cannot', () => {
  const forms = [...parse([call]).querySelectorAll('form')];
  expect(forms.map((form) => [form.method, form.getAttribute('action'), form.textContent])).toEqual([
    ['post', '/outbox/calls/CA0123/press', 'Press 1'],
    ['post', '/outbox/calls/CA0123/ring-out', 'Let it ring out'],
  ]);
  expect(parse([{ ...call, state: 'rang out' }]).querySelector('form')).toBeNull();
  expect(parse([{ ...call, state: 'key pressed' }]).querySelector('form')).toBeNull();
});

test('the codes of the staff’s authenticator apps stand at the top, with the time that is left', () => {
  const page = parse([mail], { codes: [{ name: 'Noor Haddad', code: '287082', leftS: 12 }] });
  expect(page.querySelector('section h2')?.textContent).toBe('Sign-in codes of the demo’s staff');
  const [row] = page.querySelectorAll('tr');
  expect([...(row?.children ?? [])].map((cell) => cell.textContent)).toEqual([
    'Noor Haddad',
    '287082',
    'for 12 more s',
  ]);
  expect(parse([mail]).querySelector('table')).toBeNull();
});

test('an address in a mail can be followed, without the full stop after it', () => {
  const links = [...parse([mail]).querySelectorAll('li pre a')].map((link) => link.getAttribute('href'));
  expect(links).toEqual(['http://localhost:4600/round']);
});

test('what was sent is text, never markup', () => {
  const hostile = '<img src=x onerror=alert(1)>&amp;"\'https://a.example/?a=1&b="><script>';
  const texts = { from: hostile, text: hostile, at: hostile };
  const payload = JSON.stringify({ title: hostile, body: hostile, path: `/${hostile}` });
  const page = parse(
    [
      { ...mail, ...texts, subject: hostile, to: [hostile] },
      { ...push, payload, deviceId: hostile, urgency: hostile, at: hostile },
      { ...push, payload: hostile },
      { ...call, id: hostile, to: hostile, from: hostile, spoken: [hostile], at: hostile },
      { ...sms, ...texts, to: hostile },
    ],
    { codes: [{ name: hostile, code: hostile, leftS: 1 }] },
  );
  expect(page.querySelector('img, script, [onerror]')).toBeNull();
  expect([...page.querySelectorAll('h3')].slice(0, 2).map((title) => title.textContent)).toEqual([
    hostile,
    hostile,
  ]);
  expect([...page.querySelectorAll('pre')].map((text) => text.textContent)).toEqual([
    hostile,
    hostile,
    hostile,
  ]);
  expect(page.querySelector('th')?.textContent).toBe(hostile);
});

test('the page keeps to the content policy and has a language, a title, one main and headings in order', () => {
  const page = parse([mail], { codes: [{ name: 'Noor', code: '1', leftS: 1 }] });
  expect(page.querySelectorAll('script, [style], link')).toHaveLength(0);
  expect(page.querySelectorAll('style')).toHaveLength(1);
  expect(page.documentElement.lang).toBe('en');
  expect(page.title).toBe('Outbox · Espalier demo');
  expect(page.querySelectorAll('main, h1')).toHaveLength(2);
  expect([...page.querySelectorAll('h1, h2, h3')].map(({ tagName }) => tagName)).toEqual([
    'H1',
    'H2',
    'H2',
    'H3',
  ]);
});
