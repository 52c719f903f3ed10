import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import type { Me } from '#shared/accounts/contract.ts';
import type { Method } from '#shared/http/contract.ts';
import { testPassword } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { root } from '../../scripts/places.mjs';

export type RealProcess = {
  /** Every line it has written, to either stream. */
  lines: string[];
  /** Ends it as a power cut would, and waits until it is gone. */
  kill9: () => Promise<void>;
  /** Ends it as the start script does; gives the exit code. */
  stop: () => Promise<number | null>;
  exited: Promise<number | null>;
};

/** One of the product's entry points as a process of its own, with no environment but what is given. */
export const startProcess = (entry: string, env: Record<string, string>): RealProcess => {
  const child = spawn(process.execPath, ['--import', 'tsx', entry], {
    cwd: root,
    env: { PATH: process.env.PATH, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const lines: string[] = [];
  for (const stream of [child.stdout, child.stderr]) {
    createInterface({ input: stream }).on('line', (line) => lines.push(line));
  }
  const exited = new Promise<number | null>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', resolve);
  });
  const end = async (signal: 'SIGKILL' | 'SIGTERM') => {
    child.kill(signal);
    return exited;
  };
  return {
    lines,
    exited,
    stop: () => end('SIGTERM'),
    kill9: async () => {
      await end('SIGKILL');
    },
  };
};

const readyWithinMs = 60_000;

/** The first log line with this message; fails with all that was said when the process ends before it. */
export const said = async (one: RealProcess, message: string): Promise<Record<string, unknown>> => {
  let ended = false;
  void one.exited.then(() => {
    ended = true;
  });
  const until = Date.now() + readyWithinMs;
  while (Date.now() < until) {
    const line = one.lines.find((text) => text.includes(`"msg":"${message}"`));
    if (line) return JSON.parse(line) as Record<string, unknown>;
    if (ended) break;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error(`Never said "${message}":\n${one.lines.join('\n')}`);
};

const databaseUrls = ({ urls }: TestDatabase) => ({
  APP_DATABASE_URL: urls.app,
  GATE_DATABASE_URL: urls.gate,
});
const publicUrl = 'http://localhost:4600';

export const startWebProcess = async (database: TestDatabase): Promise<RealProcess & { url: string }> => {
  const web = startProcess('server/index.ts', {
    ...databaseUrls(database),
    PORT: '0',
    PUBLIC_URL: publicUrl,
    SESSION_SECRET: 'test-session-secret-of-32-characters',
    LOG_LEVEL: 'debug',
  });
  const { address } = await said(web, 'web ready');
  return { ...web, url: `http://127.0.0.1:${(address as { port: number }).port}` };
};

export const startWorkerProcess = async (database: TestDatabase, smtpUrl: string): Promise<RealProcess> => {
  const worker = startProcess('workers/index.ts', {
    ...databaseUrls(database),
    SMTP_URL: smtpUrl,
    PUBLIC_URL: publicUrl,
    LOG_LEVEL: 'debug',
  });
  await said(worker, 'worker ready');
  return worker;
};

export type ProcessBrowser = {
  cookie: string;
  call: (method: Method, path: string, body?: unknown) => Promise<{ status: number; text: string }>;
};

/** Signs in at a web process, as a page behind its public address does. */
export const signInAt = async (url: string, { email }: { email: string }): Promise<ProcessBrowser> => {
  let cookie = '';
  let writeToken = '';
  const call: ProcessBrowser['call'] = async (method, path, body) => {
    const answer = await fetch(new URL(path, url), {
      method: method.toUpperCase(),
      headers: {
        origin: publicUrl,
        cookie,
        'x-espalier-session': writeToken,
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
      },
      ...(body === undefined ? {} : { body: typeof body === 'string' ? body : JSON.stringify(body) }),
    });
    cookie = answer.headers.getSetCookie()[0]?.split(';')[0] ?? cookie;
    return { status: answer.status, text: await answer.text() };
  };
  const { status, text } = await call('post', '/api/session', { email, password: testPassword });
  if (status !== 201) throw new Error(`Signing in failed: ${status} ${text}`);
  ({ writeToken } = (JSON.parse(text) as { me: Me }).me);
  return { cookie, call };
};
