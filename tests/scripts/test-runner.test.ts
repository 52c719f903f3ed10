import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { root } from '../../scripts/places.mjs';

/** A whole test runner starts for each of these. */
const TEST_MS = 120_000;
let local: string;

beforeAll(() => {
  local = mkdtempSync(join(tmpdir(), 'espalier-tests-'));
});

afterAll(() => {
  rmSync(local, { recursive: true });
});

async function runTests(
  filter: string,
  env: Record<string, string> = {},
): Promise<{ code: number; last: string }> {
  const child = spawn(process.execPath, ['scripts/test.mjs', filter], {
    cwd: root,
    env: { PATH: process.env.PATH, HOME: process.env.HOME, ESPALIER_LOCAL: local, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const exited = new Promise<number>((resolve) => child.once('close', resolve));
  child.stderr.resume();
  const output = await text(child.stdout);
  return { code: await exited, last: output.split('\n').at(-2) ?? '' };
}

test(
  'the last line counts what passed, and a check that failed before counts as one failed',
  async () => {
    const { code, last } = await runTests('tests/shared/plans', { CHECK_FAILED: '1' });
    expect(last).toMatch(/^[1-9]\d* passed, 1 failed$/);
    expect(code).toBe(1);
  },
  TEST_MS,
);

test.each(['tests/shared/there-is-no-such-test', 'tests/e2e/there-is-no-such-test'])(
  'a run that finds no test is a failure and says so in the last line: %s',
  async (filter) => {
    expect(await runTests(filter)).toEqual({ code: 1, last: '0 passed, 1 failed' });
  },
  TEST_MS,
);
