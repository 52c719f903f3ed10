import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { appendFileSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { createTransport } from 'nodemailer';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { openLinesFile } from '#server/fakes/lines-file.ts';
import type { Sent, SentMail } from '#server/fakes/sent.ts';
import { freePort } from '../../../scripts/ports.mjs';
import { fakeAccount } from './running.ts';

let folder: string;
let smtpPort: number;
let outboxPort: number;
let fakes: ChildProcess;

async function start(): Promise<void> {
  fakes = spawn(process.execPath, ['--import', 'tsx', 'server/fakes/index.ts'], {
    env: {
      ...process.env,
      SMTP_PORT: String(smtpPort),
      OUTBOX_PORT: String(outboxPort),
      FAKES_DIR: folder,
      TWILIO_ACCOUNT_SID: fakeAccount.accountSid,
      TWILIO_AUTH_TOKEN: fakeAccount.authToken,
    },
    stdio: ['ignore', 'pipe', 'inherit', 'ipc'],
  });
  for await (const line of createInterface({ input: fakes.stdout! })) {
    if (line.includes('fakes ready')) return;
  }
  throw new Error('The fakes ended before they were ready.');
}

async function ended(): Promise<number | null> {
  if (fakes.exitCode !== null) return fakes.exitCode;
  const [code] = (await once(fakes, 'exit')) as [number | null];
  return code;
}

function send(
  subject: string,
  auth?: { user: string; pass: string },
  to = 'Noor Haddad <noor@orchard-lane.example>',
): Promise<unknown> {
  return createTransport({ host: '127.0.0.1', port: smtpPort, auth }).sendMail({
    from: 'Espalier <no-reply@espalier.example>',
    to,
    subject,
    text: 'Öffne Espalier – lesen.',
    html: '<p>Open Espalier to read it.</p>',
  });
}

async function mails(): Promise<SentMail[]> {
  const response = await fetch(`http://127.0.0.1:${outboxPort}/sent`);
  return ((await response.json()) as Sent[]).filter((one) => one.kind === 'mail');
}

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'espalier-fakes-'));
  smtpPort = await freePort();
  outboxPort = await freePort();
  await start();
});

afterEach(async () => {
  fakes.kill('SIGKILL');
  await ended();
  rmSync(folder, { recursive: true });
});

test('a mail is kept as it arrived, newest first, also over kill -9 and a restart', async () => {
  await send('first');
  await send('second', { user: 'any', pass: 'thing' });
  fakes.kill('SIGKILL');
  await ended();
  await start();
  const kept = await mails();
  expect(kept.map((mail) => mail.subject)).toEqual(['second', 'first']);
  expect(kept[0]).toMatchObject({
    to: ['noor@orchard-lane.example'],
    from: 'no-reply@espalier.example',
    text: 'Öffne Espalier – lesen.',
    html: '<p>Open Espalier to read it.</p>',
  });
  expect(Math.abs(Date.parse(kept[0]!.at) - Date.now())).toBeLessThan(60_000);
});

test('while told to refuse it answers 451, which means try again, and keeps nothing', async () => {
  const refuse = (until: unknown): Promise<Response> =>
    fetch(`http://127.0.0.1:${outboxPort}/refuse`, { method: 'POST', body: JSON.stringify({ until }) });
  expect((await refuse('soon')).status).toBe(400);
  expect((await refuse(new Date(Date.now() + 60_000).toISOString())).status).toBe(200);
  // 451: requested action aborted, a transient failure (RFC 5321, section 4.2.3).
  await expect(send('refused')).rejects.toMatchObject({ responseCode: 451 });
  expect(await mails()).toEqual([]);
  expect((await refuse(new Date(0).toISOString())).status).toBe(200);
  await send('accepted');
  expect((await mails()).map((mail) => mail.subject)).toEqual(['accepted']);
});

test('a mailbox that is not there is refused for good, before any mail is taken', async () => {
  for (const to of ['bounce@orchard-lane.example', 'bounced-address@people.example', 'noor@bounce.example']) {
    // 550: the mailbox is unavailable (RFC 5321, 4.2.3); 5.1.1: it is not there (RFC 3463, 3.2).
    await expect(send('refused', undefined, to)).rejects.toMatchObject({
      responseCode: 550,
      response: expect.stringContaining('5.1.1') as string,
    });
  }
  expect(await mails()).toEqual([]);
});

test('it ends in order on SIGTERM, and by itself when the script that started it is gone', async () => {
  fakes.kill('SIGTERM');
  expect(await ended()).toBe(0);
  await start();
  fakes.disconnect();
  expect(await ended()).toBe(0);
});

test('of many entries the newest 500 are kept, and a line that a kill cut short is none', () => {
  const path = join(folder, 'many', 'kept.jsonl');
  const file = openLinesFile<{ id: string }>(path);
  for (let index = 0; index < 1_200; index += 1) file.put({ id: String(index) });
  const ids = file.newestFirst().map(({ id }) => id);
  expect(ids).toHaveLength(500);
  expect([ids[0], ids[499]]).toEqual(['1199', '700']);
  expect(readFileSync(path, 'utf8').split('\n').length).toBeLessThan(1_001);
  appendFileSync(path, '{"id":"12');
  const reopened = openLinesFile<{ id: string }>(path);
  expect(reopened.newestFirst().map(({ id }) => id)).toEqual(ids);
});

test('what changes stays in its place, also over a restart', () => {
  const path = join(folder, 'changed.jsonl');
  const file = openLinesFile<{ id: string; state: string }>(path);
  file.put({ id: 'first', state: 'ringing' });
  file.put({ id: 'second', state: 'ringing' });
  file.put({ id: 'first', state: 'rang out' });
  const expected = [
    { id: 'second', state: 'ringing' },
    { id: 'first', state: 'rang out' },
  ];
  expect(file.newestFirst()).toEqual(expected);
  expect(openLinesFile(path).newestFirst()).toEqual(expected);
});
