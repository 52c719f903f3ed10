import { existsSync, readdirSync, readFileSync, readlinkSync, realpathSync, rmSync } from 'node:fs';
import { basename, join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';

const FAST_STOP_WITHIN_MS = 20_000;

/** PostgreSQL's processes of this data folder: the first one and those it forked all work in it. */
function processesIn(data) {
  const folder = realpathSync(data);
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => {
      try {
        if (readlinkSync(`/proc/${pid}/cwd`) !== folder) return false;
        return basename(readlinkSync(`/proc/${pid}/exe`)).startsWith('postgres');
      } catch {
        return false;
      }
    })
    .map(Number);
}

async function gone(data, withinMs) {
  for (const end = Date.now() + withinMs; Date.now() < end; await wait(50)) {
    if (processesIn(data).length === 0) return true;
  }
  return false;
}

function signal(pid, name) {
  try {
    process.kill(pid, name);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/**
 * Ends a server that an earlier run left behind in this data folder and removes its pid file.
 * After a reboot or kill -9 that file may name a stranger's process, which would keep PostgreSQL from
 * starting; it goes only when no process works in the folder, so two servers never share it.
 */
export async function endLeftovers(data) {
  const pidFile = join(data, 'postmaster.pid');
  if (existsSync(pidFile)) {
    const first = Number(readFileSync(pidFile, 'utf8').split('\n')[0]);
    if (processesIn(data).includes(first)) signal(first, 'SIGINT');
  }
  if (!(await gone(data, FAST_STOP_WITHIN_MS))) {
    for (const pid of processesIn(data)) signal(pid, 'SIGQUIT');
    if (!(await gone(data, FAST_STOP_WITHIN_MS))) throw new Error(`A database still runs in ${data}.`);
  }
  rmSync(pidFile, { force: true });
}
