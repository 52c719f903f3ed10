import { afterAll, beforeAll, expect, it } from 'vitest';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets, testVapidPrivateKey } from '#tests/support/secrets.ts';
import { startProcess } from './processes.ts';

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(async () => {
  await database.drop();
});

it.each([
  ['web', 'server/index.ts', { SESSION_SECRET: 'test-session-secret-of-32-characters', PORT: '0' }],
  ['worker', 'workers/index.ts', { SMTP_URL: 'smtp://127.0.0.1:1' }],
] as const)(
  'a %s refuses to start as a role that could take row security away',
  async (_name, entry, env) => {
    const started = startProcess(entry, {
      APP_DATABASE_URL: database.urls.owner,
      GATE_DATABASE_URL: database.urls.gate,
      TOKEN_SECRET: testSecrets.tokenSecret,
      SEAL_SECRET: testSecrets.sealSecret,
      VAPID_PUBLIC_KEY: testSecrets.vapidPublicKey,
      VAPID_PRIVATE_KEY: testVapidPrivateKey,
      ...env,
    });
    expect(await started.exited).not.toBe(0);
    expect(started.lines.join('\n')).toContain('APP_DATABASE_URL names a role that passes row security.');
  },
  60_000,
);
