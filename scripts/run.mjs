import { join } from 'node:path';
import { tryLock } from './lock.mjs';
import { localFolder } from './places.mjs';
import { say, Stop } from './say.mjs';
import { endEarlierRun, forgetRun, recordRun } from './run-record.mjs';

/** npm passes a Ctrl-C on that the terminal has sent already: the two count as one. */
const SAME_KEY_WITHIN_MS = 700;
/** How often a run under npm looks whether npm is still there. */
const LOOK_FOR_NPM_EVERY_MS = 500;
const STOP_ORDER = ['vite', 'web', 'worker', 'fakes', 'database'];

/** Takes the place of the one run that a checkout may have at a time. */
export async function takeRunLock() {
  const held = tryLock(join(localFolder(), 'run.lock'));
  if (!held.release) {
    throw new Stop(
      `Espalier already runs from this folder (process ${held.heldBy}). End it first, with Ctrl-C there.`,
    );
  }
  await endEarlierRun();
  return held.release;
}

/**
 * Runs a sequence that starts parts, then waits until Ctrl-C or SIGTERM, or until a part stops by itself, and ends
 * all parts in order: web, worker, fakes, database. A second Ctrl-C ends them at once. The sequence gets `add`, to
 * hand over each part that it started, and `signal`, which tells it to give up. Returns the exit code.
 */
export async function run(url, sequence) {
  const parts = [];
  const giveUp = new AbortController();
  let askedAt = null;
  let asked;
  const wasAsked = new Promise((resolve) => (asked = resolve));
  let crashed;
  const hasCrashed = new Promise((_, reject) => (crashed = reject));
  hasCrashed.catch(() => undefined);

  const inOrder = () => [...parts].sort((a, b) => STOP_ORDER.indexOf(a.name) - STOP_ORDER.indexOf(b.name));
  async function endAtOnce() {
    say('Ending at once.');
    await Promise.all(parts.map((part) => part.stop('at once')));
    forgetRun();
    process.exit(130);
  }
  function onSignal() {
    if (askedAt === null) {
      askedAt = Date.now();
      say('\nEnding …');
      giveUp.abort();
      asked();
    } else if (Date.now() - askedAt > SAME_KEY_WITHIN_MS) {
      void endAtOnce();
    }
  }
  for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, onSignal);
  // npm starts a shell around this script: killing npm ends the shell and would leave the product running.
  const startedBy = process.ppid;
  const lookForNpm = setInterval(() => {
    if (process.env.npm_lifecycle_event !== undefined && process.ppid !== startedBy && askedAt === null)
      onSignal();
  }, LOOK_FOR_NPM_EVERY_MS);

  const add = (part) => {
    parts.push(part);
    recordRun(url, parts);
    part.exited.then((how) => {
      if (giveUp.signal.aborted) return;
      crashed(new Stop(`The ${part.name} stopped by itself (${how}). Its last words:\n${part.lastWords()}`));
      giveUp.abort();
    });
    return part;
  };
  const started = sequence({ add, signal: giveUp.signal });
  let failure = null;
  try {
    await Promise.race([started.then(() => wasAsked), wasAsked, hasCrashed]);
  } catch (error) {
    if (askedAt === null) failure = error;
  }
  giveUp.abort();
  // A step in progress may still hand over a part, which must not be left behind.
  await started.catch(() => undefined);
  if (failure !== null)
    process.stderr.write(`${failure instanceof Stop ? failure.message : failure.stack}\n`);
  for (const part of inOrder()) {
    say(`  ${part.name} …`);
    await part.stop();
  }
  clearInterval(lookForNpm);
  forgetRun();
  if (parts.length > 0) say('Espalier has ended.');
  return failure === null ? 0 : 1;
}
