import { spawn } from 'node:child_process';
import { readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { ensureInstalled } from './install.mjs';
import { localFolder, root } from './places.mjs';
import { say } from './say.mjs';
import { countPlaywright, countVitest, ONE_FAILED } from './test-counts.mjs';

/** Runs a program to its end with its output on the terminal, and returns its exit code. */
function show(command, args, env = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'inherit', 'inherit'],
    });
    const pass = () => child.kill('SIGTERM');
    process.once('SIGTERM', pass);
    child.once('error', (error) => {
      say(error.message);
      resolve(1);
    });
    child.once('close', (code) => {
      process.off('SIGTERM', pass);
      resolve(code ?? 1);
    });
  });
}

function readReport(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return null;
  }
}

async function runVitest(filters) {
  const report = join(localFolder('test-reports'), 'vitest.json');
  rmSync(report, { force: true });
  const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...filters];
  const exitCode = await show(join(root, 'node_modules/.bin/vitest'), args);
  return countVitest(readReport(report), exitCode);
}

async function runPlaywright(filters) {
  const report = join(localFolder('test-reports'), 'playwright.json');
  rmSync(report, { force: true });
  const args = ['test', '--reporter=list,json', ...filters];
  const env = { PLAYWRIGHT_JSON_OUTPUT_FILE: report };
  const exitCode = await show(join(root, 'node_modules/.bin/playwright'), args, env);
  return countPlaywright(readReport(report), exitCode);
}

/** `npm test -- tests/shared` runs what lies below; without a filter everything runs. */
async function runAll(filters) {
  await ensureInstalled({ chromium: true });
  const forBrowser = filters.filter((filter) => filter.includes('e2e'));
  const others = filters.filter((filter) => !filter.includes('e2e'));
  const results = [];
  if (filters.length === 0 || others.length > 0) results.push(await runVitest(others));
  if (interrupted) return [...results, ONE_FAILED];
  if (filters.length === 0 || forBrowser.length > 0) results.push(await runPlaywright(forBrowser));
  return results;
}

// Ctrl-C reaches the runner too; this script stays to count and to say the last line.
let interrupted = false;
for (const name of ['SIGINT', 'SIGTERM']) process.on(name, () => (interrupted = true));
const results = await runAll(process.argv.slice(2)).catch((error) => {
  say(error.message);
  return [ONE_FAILED];
});
if (process.env.CHECK_FAILED !== undefined) {
  say('\nnpm run check failed before the tests and counts as one failed.');
  results.push(ONE_FAILED);
}
const sum = (key) => results.reduce((total, result) => total + result[key], 0);
if (sum('skipped') > 0) say(`\n${sum('skipped')} skipped`);
if (sum('failed') > 0 || sum('passed') === 0) process.exitCode = 1;
say(`\n${sum('passed')} passed, ${sum('failed')} failed`);
