import { spawn } from 'node:child_process';
import { text } from 'node:stream/consumers';
import { expect, test } from 'vitest';
import { root } from '../../scripts/places.mjs';

async function runTests(
  filters: string[],
  env: Record<string, string> = {},
): Promise<{ code: number; last: string }> {
  const child = spawn(process.execPath, ['scripts/test.mjs', ...filters], {
    cwd: root,
    env: {
      ...process.env,
      VITEST: undefined,
      VITEST_POOL_ID: undefined,
      VITEST_WORKER_ID: undefined,
      ...env,
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const exited = new Promise<number>((resolve) => child.once('close', resolve));
  const output = await text(child.stdout);
  return { code: await exited, last: output.trimEnd().split('\n').at(-1) ?? '' };
}

const TEST_MS = 60_000;

test(
  'what passed is counted in the last line',
  async () => {
    const { code, last } = await runTests(['tests/shared/plans']);
    expect(last).toMatch(/^[1-9]\d* passed, 0 failed$/);
    expect(code).toBe(0);
  },
  TEST_MS,
);

test(
  'a failed check before the tests counts as one failed, and everything fails',
  async () => {
    const { code, last } = await runTests(['tests/shared/plans'], { CHECK_FAILED: '1' });
    expect(last).toMatch(/^[1-9]\d* passed, 1 failed$/);
    expect(code).toBe(1);
  },
  TEST_MS,
);

test(
  'a run that finds no test is a failure and says so in the last line',
  async () => {
    expect(await runTests(['tests/shared/there-is-no-such-test'])).toEqual({
      code: 1,
      last: '0 passed, 1 failed',
    });
  },
  TEST_MS,
);

test(
  'a browser run that finds no test is a failure too',
  async () => {
    expect(await runTests(['tests/e2e/there-is-no-such-test'])).toEqual({
      code: 1,
      last: '0 passed, 1 failed',
    });
  },
  TEST_MS,
);
