import { execFileSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, readdirSync, rmSync, statSync, symlinkSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, test, vi } from 'vitest';
import { root } from '../../scripts/places.mjs';
import { freePort } from '../../scripts/ports.mjs';
import { launchProduct, startProduct, type Product } from '../support/product.ts';

const ENDED_IN_ORDER = [
  'Ending …',
  '  web …',
  '  worker …',
  '  fakes …',
  '  database …',
  'Espalier has ended.',
];

/** The first start of a test run may have to build. */
const TEST_MS = 240_000;

const cleanUp: (() => unknown)[] = [];

afterEach(async () => {
  for (const step of cleanUp.splice(0).reverse()) await step();
});

function isRunning(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

/** An account without rights: root hands over to Debian's `nobody`, anybody else is one already. */
function ordinaryUser(): { uid: number; gid: number } | undefined {
  if (process.getuid?.() !== 0) return undefined;
  const id = (flag: string): number => Number(execFileSync('id', [flag, 'nobody'], { encoding: 'utf8' }));
  return { uid: id('-u'), gid: id('-g') };
}

/** A copy of this checkout that belongs to the user; the installed packages are shared, and not writable for it. */
function copyCheckout(user: { uid: number; gid: number } | undefined): string {
  const copy = mkdtempSync(join(tmpdir(), 'espalier-checkout-'));
  cleanUp.push(() => rmSync(copy, { recursive: true }));
  const files = execFileSync('git', ['ls-files', '-z', '--cached', '--others', '--exclude-standard'], {
    cwd: root,
    encoding: 'utf8',
  });
  for (const file of files.split('\0').filter((name) => name !== ''))
    cpSync(join(root, file), join(copy, file));
  mkdirSync(join(copy, 'node_modules'));
  // The build tool writes beside the packages, so that folder is the user's own.
  for (const name of readdirSync(join(root, 'node_modules')).filter((entry) => !entry.startsWith('.vite'))) {
    symlinkSync(join(root, 'node_modules', name), join(copy, 'node_modules', name));
  }
  if (user) execFileSync('chown', ['-RP', '-h', `${user.uid}:${user.gid}`, copy]);
  return copy;
}

test(
  'an ordinary user starts it from a clone, and Ctrl-C ends everything in order',
  async () => {
    const asUser = ordinaryUser();
    const product = await startProduct({ asUser, checkout: copyCheckout(asUser) });
    cleanUp.push(product.stop);
    const port = new URL(product.url).port;
    expect(product.output()).toContain(`Espalier is ready at http://localhost:${port}`);
    expect(product.outboxUrl).toBe(`http://localhost:${port}/outbox`);
    expect(product.accounts.length).toBeGreaterThan(0);
    for (const account of product.accounts) {
      expect(account.email).toMatch(/\.example$/);
      // 15 characters is the shortest password that the product accepts (D).
      expect(account.password.length).toBeGreaterThanOrEqual(15);
    }
    expect((await fetch(`${product.url}/readyz`)).status).toBe(200);
    expect((await fetch(product.outboxUrl)).status).toBe(200);

    const pids = product.pids();
    expect(Object.keys(pids)).toEqual(['database', 'fakes', 'web', 'worker']);
    for (const pid of Object.values(pids)) {
      expect(statSync(`/proc/${pid}`).uid).toBe(asUser?.uid ?? process.getuid?.());
    }
    expect(statSync(join(product.local, 'secrets.json')).mode & 0o777).toBe(0o600);

    expect(await product.stop()).toBe(0);
    expect(product.output().split('\n').slice(-ENDED_IN_ORDER.length)).toEqual(ENDED_IN_ORDER);
    expect(Object.values(pids).filter(isRunning)).toEqual([]);
  },
  TEST_MS,
);

describe('one run', () => {
  let product: Product;

  beforeAll(async () => {
    product = await startProduct();
  }, TEST_MS);

  afterAll(() => product.stop());

  test('a second start in the same place refuses in one line while the first runs', async () => {
    const second = await launchProduct(await freePort(), { local: product.local });
    expect(await second.exited).toBe(1);
    expect(second.output()).toBe(
      `Espalier already runs from this folder (process ${product.pid}). End it first, with Ctrl-C there.`,
    );
    expect((await fetch(`${product.url}/readyz`)).status).toBe(200);
  });

  test('a part that crashes ends everything, by name and with an exit code', async () => {
    const pids = product.pids();
    process.kill(pids.worker!, 'SIGKILL');
    expect(await product.exited).toBe(1);
    expect(product.output()).toContain('The worker stopped by itself (killed by SIGKILL). Its last words:');
    expect(product.output()).toContain('worker ready');
    expect(Object.values(pids).filter(isRunning)).toEqual([]);
  });
});

test(
  'after kill -9 of the start script its parts end, and the next start finds the same clinic',
  async () => {
    const killed = await startProduct();
    cleanUp.push(killed.stop);
    const { database, ...others } = killed.pids();
    cleanUp.push(() => isRunning(database!) && process.kill(database!, 'SIGQUIT'));
    process.kill(killed.pid, 'SIGKILL');
    await vi.waitFor(() => expect(Object.values(others).filter(isRunning)).toEqual([]), { timeout: 10_000 });

    const next = await startProduct({ local: killed.local });
    cleanUp.push(next.stop);
    expect(isRunning(database!)).toBe(false);
    expect(next.accounts).toEqual(killed.accounts);
    expect(await next.stop()).toBe(0);
  },
  TEST_MS,
);

test('a port that another program has is named in one line, and nothing is started', async () => {
  const port = await freePort();
  const taker = createServer();
  await new Promise<void>((resolve) => taker.listen(port, '127.0.0.1', resolve));
  cleanUp.push(() => taker.close());
  const launch = await launchProduct(port, {});
  cleanUp.push(launch.stop);
  expect(await launch.exited).toBe(1);
  expect(launch.output()).toBe(
    `Port ${port} on 127.0.0.1 is taken by another program. Choose another with PORT=${port + 100}.`,
  );
});

test.each([
  [{ PORT: '70000' }, 'PORT must be a whole number from 1 to 65535, not "70000".'],
  [{ PUBLIC_URL: 'here' }, 'PUBLIC_URL must be an address such as http://localhost:4600, not "here".'],
  [
    { HOST: '0.0.0.0' },
    'The demo has published passwords and an open outbox, and HOST or PUBLIC_URL leads beyond this machine. Set DEMO=off, or DEMO=on to show it all the same.',
  ],
  [{ DEMO: 'off' }, 'With DEMO=off set SMTP_URL, the address of the mail server to send through.'],
])('a setting that does not fit is refused in one line: %o', async (env, line) => {
  const launch = await launchProduct(4600, { env });
  cleanUp.push(launch.stop);
  expect(await launch.exited).toBe(1);
  expect(launch.output()).toBe(line);
});
