import { appendFileSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Mail } from './mail.ts';

/** Older mails than these are forgotten. */
const KEPT_MAILS = 500;

export type MailFile = {
  add: (mail: Mail) => void;
  newestFirst: () => Mail[];
};

/** A line that a kill cut short at the end of the file is no mail; any other broken line is an error. */
function readMails(path: string): Mail[] {
  if (!existsSync(path)) return [];
  const whole = readFileSync(path, 'utf8').split('\n').slice(0, -1);
  return whole.filter((line) => line !== '').map((line) => JSON.parse(line) as Mail);
}

/** The mails in a folder, one JSON line each, so that a restart still shows them. */
export function openMailFile(folder: string): MailFile {
  mkdirSync(folder, { recursive: true });
  const path = join(folder, 'mails.jsonl');
  let mails = readMails(path).slice(-KEPT_MAILS);
  let lines = 0;

  function rewrite(): void {
    writeFileSync(`${path}.new`, mails.map((mail) => `${JSON.stringify(mail)}\n`).join(''), { mode: 0o600 });
    renameSync(`${path}.new`, path);
    lines = mails.length;
  }

  rewrite();
  return {
    add(mail) {
      mails = [...mails, mail].slice(-KEPT_MAILS);
      appendFileSync(path, `${JSON.stringify(mail)}\n`);
      lines += 1;
      if (lines >= 2 * KEPT_MAILS) rewrite();
    },
    newestFirst: () => mails.toReversed(),
  };
}
