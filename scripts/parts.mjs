import { spawn } from 'node:child_process';
import { existsSync, openSync, renameSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { setTimeout as wait } from 'node:timers/promises';
import { lastLines } from './logs.mjs';
import { localFolder, root } from './places.mjs';
import { Stop } from './say.mjs';

/** A part that has not ended this long after it was asked to is killed; the web's own drain is shorter. */
const END_WITHIN_MS = 15_000;

/** Signals a process and all that it started; one that is gone already is no error. */
export function signalGroup(pid, name) {
  try {
    process.kill(-pid, name);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/**
 * Starts a part of the product as a Node process in a group of its own, so that the terminal's Ctrl-C does not
 * reach it, with a channel whose closing tells it that this script is gone. What it says goes to its log in
 * `.local/logs` and, with `echo`, to the terminal.
 */
export function startPart({ name, args, env, echo = false }) {
  const log = join(localFolder('logs'), `${name}.log`);
  if (existsSync(log)) renameSync(log, `${log}.old`);
  const descriptor = openSync(log, 'w', 0o600);
  const child = spawn(process.execPath, args, {
    cwd: root,
    // DATABASE_URL is the owner's way in, which no running part may have.
    env: { ...process.env, DATABASE_URL: undefined, ...env },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    detached: true,
  });
  const listeners = new Set();
  for (const stream of [child.stdout, child.stderr]) {
    createInterface({ input: stream }).on('line', (line) => {
      writeSync(descriptor, `${line}\n`);
      if (echo) process.stdout.write(`[${name}] ${line}\n`);
      for (const listen of listeners) listen(line);
    });
  }
  const exited = new Promise((resolve) => {
    child.once('error', (error) => resolve(error.message));
    // Its last words may still be on their way when it exits; a grandchild may hold the pipes open for ever.
    child.once('exit', async (code, signal) => {
      await Promise.race([new Promise((closed) => child.once('close', closed)), wait(500)]);
      resolve(signal === null ? `exit code ${code}` : `killed by ${signal}`);
    });
  });
  return {
    name,
    pid: child.pid,
    exited,
    lastWords: () => lastLines(log),
    /** Resolves when the part says a line that contains the text. */
    says: (text) =>
      new Promise((resolve) => {
        const listen = (line) => {
          if (!line.includes(text)) return;
          listeners.delete(listen);
          resolve();
        };
        listeners.add(listen);
      }),
    async stop(how = 'orderly') {
      signalGroup(child.pid, how === 'orderly' ? 'SIGTERM' : 'SIGKILL');
      const impatient = setTimeout(() => signalGroup(child.pid, 'SIGKILL'), END_WITHIN_MS);
      await exited;
      clearTimeout(impatient);
      signalGroup(child.pid, 'SIGKILL');
    },
  };
}

/** Waits until an address answers 200; `signal` ends the wait. */
export async function answers(url, { signal, withinMs = 60_000 }) {
  let last = 'no answer';
  for (const end = Date.now() + withinMs; Date.now() < end; await wait(100, undefined, { signal })) {
    try {
      const response = await fetch(url, { signal: AbortSignal.any([signal, AbortSignal.timeout(5_000)]) });
      const body = await response.text();
      if (response.status === 200) return;
      last = `${response.status} ${body.slice(0, 500)}`;
    } catch (error) {
      signal.throwIfAborted();
      last = error.cause?.message ?? error.message;
    }
  }
  throw new Stop(`${url} did not answer within ${withinMs / 1000} seconds (${last}).`);
}
