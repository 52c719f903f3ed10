import { linkSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';

/** When a process began, in clock ticks since boot, with the boot's id: tells a reused pid from the same process. */
export function processBirth(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The name in brackets may hold spaces; the 22nd field of proc(5) is the 20th after it.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z') return null;
    return `${readFileSync('/proc/sys/kernel/random/boot_id', 'utf8').trim()} ${fields[19]}`;
  } catch {
    return null;
  }
}

/** Whether the process that wrote down this pid and birth still runs. */
export function stillRuns({ pid, birth }) {
  return Number.isInteger(pid) && birth !== null && processBirth(pid) === birth;
}

function readHolder(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return null;
  }
}

/**
 * Takes the lock file and returns its release, or the holder's pid when a living process has it.
 * The file appears by link(2), so nobody ever reads it half-written.
 */
export function tryLock(path) {
  mkdirSync(dirname(path), { recursive: true });
  const own = `${path}.${process.pid}`;
  writeFileSync(own, JSON.stringify({ pid: process.pid, birth: processBirth(process.pid) }));
  try {
    for (;;) {
      try {
        linkSync(own, path);
        return { release: () => rmSync(path, { force: true }) };
      } catch (error) {
        if (error.code !== 'EEXIST') throw error;
      }
      const holder = readHolder(path);
      if (holder !== null && stillRuns(holder)) return { heldBy: holder.pid };
      setAside(path, holder);
    }
  } finally {
    rmSync(own, { force: true });
  }
}

/** Removes a dead holder's file; one that a living process put there in the meantime goes back. */
function setAside(path, dead) {
  const aside = `${path}.${process.pid}.stale`;
  try {
    renameSync(path, aside);
  } catch (error) {
    if (error.code === 'ENOENT') return;
    throw error;
  }
  const found = readHolder(aside);
  if (found !== null && found.birth !== dead?.birth && stillRuns(found)) linkSync(aside, path);
  rmSync(aside, { force: true });
}

/** Waits for the lock, telling once that it waits; `signal` ends the wait. */
export async function lock(path, whileWaiting, signal) {
  for (let told = false; ; told = true) {
    const held = tryLock(path);
    if (held.release) return held.release;
    if (!told) whileWaiting(held.heldBy);
    await wait(250, undefined, { signal });
  }
}
