import { spawn } from 'node:child_process';
import { readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { ensureInstalled } from './install.mjs';
import { localFolder, root } from './places.mjs';
import { say } from './say.mjs';

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

/** A runner that failed without naming a failed test, or left no report, counts as one failed. */
function counted({ passed, failed, skipped }, exitCode) {
  return { passed, failed: exitCode !== 0 ? Math.max(failed, 1) : failed, skipped };
}

const NOTHING = { passed: 0, failed: 0, skipped: 0 };

async function runVitest(filters) {
  const report = join(localFolder('test-reports'), 'vitest.json');
  rmSync(report, { force: true });
  const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...filters];
  const exitCode = await show(join(root, 'node_modules/.bin/vitest'), args);
  const result = readReport(report);
  if (result === null) return counted(NOTHING, 1);
  // A file that could not be loaded has no tests in the report, but is a failure all the same.
  const brokenFiles = result.testResults.filter(
    (file) => file.status === 'failed' && file.assertionResults.every((test) => test.status !== 'failed'),
  );
  return counted(
    {
      passed: result.numPassedTests,
      failed: result.numFailedTests + brokenFiles.length,
      skipped: result.numPendingTests + result.numTodoTests,
    },
    exitCode,
  );
}

async function runPlaywright(filters) {
  const report = join(localFolder('test-reports'), 'playwright.json');
  rmSync(report, { force: true });
  const args = ['test', '--reporter=list,json', ...filters];
  const env = { PLAYWRIGHT_JSON_OUTPUT_FILE: report };
  const exitCode = await show(join(root, 'node_modules/.bin/playwright'), args, env);
  const result = readReport(report);
  if (result === null) return counted(NOTHING, 1);
  const { expected, unexpected, flaky, skipped } = result.stats;
  return counted({ passed: expected, failed: unexpected + flaky, skipped }, exitCode);
}

/** `npm test -- tests/shared` runs what lies below; without a filter everything runs. */
async function runAll(filters) {
  await ensureInstalled({ chromium: true });
  const forBrowser = filters.filter((filter) => filter.includes('e2e'));
  const others = filters.filter((filter) => !filter.includes('e2e'));
  const results = [];
  if (filters.length === 0 || others.length > 0) results.push(await runVitest(others));
  if (filters.length === 0 || forBrowser.length > 0) results.push(await runPlaywright(forBrowser));
  return results;
}

// Ctrl-C reaches the runner too; this script stays to count and to say the last line.
process.on('SIGINT', () => undefined);
const results = await runAll(process.argv.slice(2)).catch((error) => {
  say(error.message);
  return [counted(NOTHING, 1)];
});
if (process.env.CHECK_FAILED !== undefined) {
  say('\nnpm run check failed before the tests and counts as one failed.');
  results.push(counted(NOTHING, 1));
}
const sum = (key) => results.reduce((total, result) => total + result[key], 0);
if (sum('skipped') > 0) say(`\n${sum('skipped')} skipped`);
if (sum('failed') > 0 || sum('passed') === 0) process.exitCode = 1;
say(`\n${sum('passed')} passed, ${sum('failed')} failed`);
