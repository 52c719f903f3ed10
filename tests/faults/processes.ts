import { testSecrets, testVapidPrivateKey } from '#tests/support/secrets.ts';
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
  /** The first line that contains the text; fails with all that was said when the process ends without it. */
  says: (text: string) => Promise<string>;
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
  const listeners = new Set<() => void>();
  const tell = () => listeners.forEach((listen) => listen());
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
  const end = (signal: 'SIGKILL' | 'SIGTERM') => {
    child.kill(signal);
    return exited;
  };
  return {
    lines,
    exited,
    says: (text) =>
      new Promise((resolve, reject) => {
        const listen = () => {
          const line = lines.find((one) => one.includes(text));
          if (line === undefined && !ended) return;
          listeners.delete(listen);
          if (line === undefined) reject(new Error(`Never said "${text}":\n${lines.join('\n')}`));
          else resolve(line);
        };
        listeners.add(listen);
        listen();
      }),
    stop: () => end('SIGTERM'),
    kill9: async () => {
      await end('SIGKILL');
    },
  };
};

const databaseUrls = ({ urls }: TestDatabase) => ({
  APP_DATABASE_URL: urls.app,
  GATE_DATABASE_URL: urls.gate,
});
const secretsOfBoth = {
  TOKEN_SECRET: testSecrets.tokenSecret,
  VAPID_PUBLIC_KEY: testSecrets.vapidPublicKey,
};
const publicUrl = 'http://localhost:4600';

export const startWebProcess = async (database: TestDatabase): Promise<RealProcess & { url: string }> => {
  const web = startProcess('server/index.ts', {
    ...databaseUrls(database),
    PORT: '0',
    PUBLIC_URL: publicUrl,
    SESSION_SECRET: 'test-session-secret-of-32-characters',
    ...secretsOfBoth,
    SEAL_SECRET: testSecrets.sealSecret,
    LOG_LEVEL: 'debug',
  });
  const { address } = JSON.parse(await web.says('"msg":"web ready"')) as { address: { port: number } };
  return { ...web, url: `http://127.0.0.1:${address.port}` };
};

export const startWorkerProcess = async (database: TestDatabase, smtpUrl: string): Promise<RealProcess> => {
  const worker = startProcess('workers/index.ts', {
    ...databaseUrls(database),
    SMTP_URL: smtpUrl,
    ...secretsOfBoth,
    VAPID_PRIVATE_KEY: testVapidPrivateKey,
    PUBLIC_URL: publicUrl,
    LOG_LEVEL: 'debug',
  });
  await worker.says('"msg":"worker ready"');
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
