import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { appendFileSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { createTransport } from 'nodemailer';
import { afterEach, beforeEach, expect, test } from 'vitest';
import type { Mail } from '#server/fakes/mail.ts';
import { openMailFile } from '#server/fakes/mail-file.ts';
import { freePort } from '../../../scripts/ports.mjs';

let folder: string;
let smtpPort: number;
let outboxPort: number;
let fakes: ChildProcess;

async function start(): Promise<void> {
  fakes = spawn(process.execPath, ['--import', 'tsx', 'server/fakes/index.ts'], {
    env: { ...process.env, SMTP_PORT: String(smtpPort), OUTBOX_PORT: String(outboxPort), FAKES_DIR: folder },
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

function send(subject: string, auth?: { user: string; pass: string }): Promise<unknown> {
  return createTransport({ host: '127.0.0.1', port: smtpPort, auth }).sendMail({
    from: 'Espalier <no-reply@espalier.example>',
    to: 'Noor Haddad <noor@orchard-lane.example>',
    subject,
    text: 'Öffne Espalier – lesen.',
    html: '<p>Open Espalier to read it.</p>',
  });
}

async function mails(): Promise<Mail[]> {
  const response = await fetch(`http://127.0.0.1:${outboxPort}/mails`);
  return (await response.json()) as Mail[];
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

test('it ends in order on SIGTERM, and by itself when the script that started it is gone', async () => {
  fakes.kill('SIGTERM');
  expect(await ended()).toBe(0);
  await start();
  fakes.disconnect();
  expect(await ended()).toBe(0);
});

test('of many mails the newest 500 are kept, and a line that a kill cut short is no mail', () => {
  const kept = join(folder, 'many');
  const file = openMailFile(kept);
  const mail = (subject: string): Mail => ({ to: [], from: '', subject, text: '', html: null, at: '' });
  for (let index = 0; index < 1_200; index += 1) file.add(mail(String(index)));
  const subjects = (from: Mail[]): string[] => from.map((each) => each.subject);
  expect(subjects(file.newestFirst())).toHaveLength(500);
  expect(subjects(file.newestFirst())[0]).toBe('1199');
  const path = join(kept, 'mails.jsonl');
  expect(readFileSync(path, 'utf8').split('\n').length).toBeLessThan(1_001);
  appendFileSync(path, '{"to":[],"from":"","sub');
  const reopened = openMailFile(kept);
  expect(subjects(reopened.newestFirst())).toEqual(subjects(file.newestFirst()));
});
