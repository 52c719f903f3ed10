import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { chmod, chown, mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { root } from '../../scripts/places.mjs';
import { freePort } from '../../scripts/ports.mjs';

type DemoAccount = { who: string; role: string; email: string; password: string };

/** A product launched as a person does it: by the start script, on a port and with a database of its own. */
export type Product = {
  url: string;
  outboxUrl: string;
  accounts: DemoAccount[];
  /** Its own place for what a checkout keeps under `.local/`. */
  local: string;
  /** The start script's process. */
  pid: number;
  /** The present processes by name: database, fakes, web, worker. */
  pids: () => Record<string, number>;
  /** All that the start script has printed so far. */
  output: () => string;
  /** The start script's exit code, once it has ended. */
  exited: Promise<number | null>;
  /** Ends it as Ctrl-C does, removes what it kept, and returns its exit code. */
  stop: () => Promise<number | null>;
};

type ProductOptions = {
  /** Another copy of the checkout than this one. */
  checkout?: string;
  /** The account that runs it; root alone can choose another than its own. */
  asUser?: { uid: number; gid: number };
  env?: Record<string, string>;
  /** The place of an earlier launch, to find its data again; a new one by default. */
  local?: string;
};

type Launch = Pick<Product, 'local' | 'pid' | 'output' | 'exited' | 'stop'> & {
  /** Resolves with the first line that contains the text; rejects when the script ends before it. */
  says: (text: string) => Promise<string>;
};

/** Launches the start script without waiting for it to be ready. */
export async function launchProduct(port: number, options: ProductOptions): Promise<Launch> {
  const local = options.local ?? (await mkdtemp(join(tmpdir(), 'espalier-')));
  // The account that runs PostgreSQL is another one when this is root.
  await chmod(local, 0o755);
  if (options.asUser !== undefined) await chown(local, options.asUser.uid, options.asUser.gid);
  const env: NodeJS.ProcessEnv = {
    PATH: process.env.PATH,
    HOME: local,
    PORT: String(port),
    ESPALIER_LOCAL: local,
    ...options.env,
  };
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    ...options.asUser,
    cwd: options.checkout ?? root,
    env,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const lines: string[] = [];
  const listeners = new Set<() => void>();
  const tell = (): void => listeners.forEach((listen) => listen());
  for (const stream of [child.stdout, child.stderr]) {
    createInterface({ input: stream }).on('line', (line) => {
      lines.push(line);
      tell();
    });
  }
  let ended = false;
  const exited = new Promise<number | null>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code) => {
      ended = true;
      resolve(code);
      tell();
    });
  });
  const output = (): string => lines.join('\n');
  return {
    local,
    pid: child.pid ?? 0,
    output,
    exited,
    says: (text) =>
      new Promise((resolve, reject) => {
        const listen = (): void => {
          const found = lines.find((line) => line.includes(text));
          if (found === undefined && !ended) return;
          listeners.delete(listen);
          if (found === undefined)
            reject(new Error(`The product ended without saying "${text}":\n${output()}`));
          else resolve(found);
        };
        listeners.add(listen);
        listen();
      }),
    stop: async () => {
      child.kill('SIGINT');
      const code = await exited;
      await rm(local, { recursive: true, force: true });
      return code;
    },
  };
}

function readPids(local: string): Record<string, number> {
  const path = join(local, 'run.json');
  if (!existsSync(path)) return {};
  const { parts } = JSON.parse(readFileSync(path, 'utf8')) as { parts: Record<string, { pid: number }> };
  return Object.fromEntries(Object.entries(parts).map(([name, { pid }]) => [name, pid]));
}

function readAccounts(output: string): DemoAccount[] {
  const lines = output.split('\n');
  const first = lines.findIndex((line) => line.startsWith('Demo accounts')) + 1;
  const rows = lines.slice(first, lines.indexOf('', first));
  return rows.map((row) => {
    const [who = '', role = '', email = '', password = ''] = row.trim().split(/ {2,}/);
    return { who, role, email, password };
  });
}

/** Launches the product and waits until it says that it is ready. Building it first may take a minute. */
export async function startProduct(options: ProductOptions = {}): Promise<Product> {
  const port = await freePort();
  const launch = await launchProduct(port, options);
  try {
    const ready = await launch.says('Espalier is ready at ');
    const outbox = await launch.says('Outbox: ');
    return {
      local: launch.local,
      pid: launch.pid,
      output: launch.output,
      exited: launch.exited,
      stop: launch.stop,
      url: ready.replace('Espalier is ready at ', ''),
      outboxUrl: outbox.replace('Outbox: ', ''),
      accounts: readAccounts(launch.output()),
      pids: () => readPids(launch.local),
    };
  } catch (error) {
    await launch.stop();
    throw error;
  }
}
