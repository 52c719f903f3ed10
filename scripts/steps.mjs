import { spawn } from 'node:child_process';
import { root } from './places.mjs';
import { Stop } from './say.mjs';

/**
 * Runs a command to its end, out of reach of the terminal's Ctrl-C, and returns what it printed on standard
 * output. Standard input is empty or the `input` given. When it fails, the Stop carries all that it said.
 */
export function runStep(command, args, { signal, input = null, ...options } = {}) {
  return new Promise((resolve, reject) => {
    signal?.throwIfAborted();
    const child = spawn(command, args, {
      cwd: root,
      ...options,
      stdio: [input === null ? 'ignore' : 'pipe', 'pipe', 'pipe'],
      detached: true,
    });
    const end = () => process.kill(-child.pid, 'SIGTERM');
    signal?.addEventListener('abort', end, { once: true });
    let answer = '';
    let words = '';
    child.stdout.setEncoding('utf8').on('data', (chunk) => {
      answer += chunk;
      words += chunk;
    });
    child.stderr.setEncoding('utf8').on('data', (chunk) => (words += chunk));
    child.once('error', reject);
    child.once('close', (code, killedBy) => {
      signal?.removeEventListener('abort', end);
      if (code === 0) resolve(answer);
      else
        reject(new Stop(`${words.trimEnd()}\n${[command, ...args].join(' ')} failed (${code ?? killedBy}).`));
    });
    if (input === null) return;
    // A program that stopped before it read its input says why itself.
    child.stdin.on('error', () => undefined);
    child.stdin.end(input);
  });
}
