import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { processBirth, stillRuns } from './lock.mjs';
import { signalGroup } from './parts.mjs';
import { localFolder } from './places.mjs';
import { say } from './say.mjs';

const END_WITHIN_MS = 15_000;
const path = () => join(localFolder(), 'run.json');

/** Writes down which processes make up the present run, for tests and for the start after a kill -9. */
export function recordRun(url, parts) {
  const processes = parts.map(({ name, pid }) => [name, { pid, birth: processBirth(pid) }]);
  writeFileSync(path(), `${JSON.stringify({ url, parts: Object.fromEntries(processes) }, null, 2)}\n`);
}

export function forgetRun() {
  rmSync(path(), { force: true });
}

/** Ends what a killed run left behind. The database is no part of this: its own start looks after it. */
export async function endEarlierRun() {
  if (!existsSync(path())) return;
  const { parts } = JSON.parse(readFileSync(path(), 'utf8'));
  const left = Object.entries(parts).filter(([name, part]) => name !== 'database' && stillRuns(part));
  if (left.length > 0)
    say(`Ending what an earlier run left behind: ${left.map(([name]) => name).join(', ')}.`);
  for (const [, part] of left) signalGroup(part.pid, 'SIGTERM');
  const end = Date.now() + END_WITHIN_MS;
  while (left.some(([, part]) => stillRuns(part))) {
    if (Date.now() > end) for (const [, part] of left) signalGroup(part.pid, 'SIGKILL');
    await wait(50);
  }
  forgetRun();
}
