import { appendFileSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';

export type LinesFile<T> = {
  /** Keeps it, in the place of the one with the same id. */
  put: (entry: T) => void;
  get: (id: string) => T | undefined;
  newestFirst: () => T[];
};

/** A line that a kill cut short at the end of the file is none; any other broken line is an error. */
function readLines<T>(path: string): T[] {
  if (!existsSync(path)) return [];
  const whole = readFileSync(path, 'utf8').split('\n').slice(0, -1);
  return whole.filter((line) => line !== '').map((line) => JSON.parse(line) as T);
}

/** Entries in a file, one JSON line each, so that a restart still has them. A later line of an id replaces it. */
export function openLinesFile<T extends { id: string }>(path: string, keptEntries = 500): LinesFile<T> {
  mkdirSync(dirname(path), { recursive: true });
  const entries = new Map<string, T>();
  let lines = 0;

  function keep(entry: T): void {
    entries.set(entry.id, entry);
    const [oldest] = entries.keys();
    if (entries.size > keptEntries && oldest !== undefined) entries.delete(oldest);
  }

  function rewrite(): void {
    const text = [...entries.values()].map((entry) => `${JSON.stringify(entry)}\n`).join('');
    writeFileSync(`${path}.new`, text, { mode: 0o600 });
    renameSync(`${path}.new`, path);
    lines = entries.size;
  }

  for (const entry of readLines<T>(path)) keep(entry);
  rewrite();
  return {
    put(entry) {
      keep(entry);
      appendFileSync(path, `${JSON.stringify(entry)}\n`);
      lines += 1;
      if (lines >= 2 * keptEntries) rewrite();
    },
    get: (id) => entries.get(id),
    newestFirst: () => [...entries.values()].toReversed(),
  };
}
