import { existsSync, readFileSync } from 'node:fs';

/** The last lines of a log, which is where a program that stopped says why. */
export function lastLines(path, count = 12) {
  if (!existsSync(path)) return '';
  return readFileSync(path, 'utf8').trimEnd().split('\n').slice(-count).join('\n');
}
