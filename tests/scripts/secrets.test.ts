import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { text } from 'node:stream/consumers';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';

const script = `import('${join(import.meta.dirname, '../../scripts/secrets.mjs')}')
  .then(({ secrets }) => process.stdout.write(JSON.stringify(secrets())))`;

let local: string;
let path: string;

beforeEach(() => {
  local = mkdtempSync(join(tmpdir(), 'espalier-secrets-'));
  path = join(local, 'secrets.json');
});

afterEach(() => {
  rmSync(local, { recursive: true });
});

async function readSecrets(): Promise<Record<string, string>> {
  const env = { ...process.env, ESPALIER_LOCAL: local };
  const child = spawn(process.execPath, ['-e', script], { env, stdio: ['ignore', 'pipe', 'inherit'] });
  return JSON.parse(await text(child.stdout)) as Record<string, string>;
}

test('secrets are made once, each its own, and readable by their user alone', async () => {
  const made = await readSecrets();
  expect(statSync(path).mode & 0o777).toBe(0o600);
  expect(new Set(Object.values(made)).size).toBe(Object.keys(made).length);
  // 256 bits each, as OWASP asks of session secrets at least 128 (CP).
  const { vapidPublicKey, vapidPrivateKey, ...random } = made;
  for (const secret of Object.values(random)) expect(secret).toMatch(/^[0-9a-f]{64}$/);
  // RFC 8292, section 3.2: an uncompressed point of P-256, which is 65 bytes; its private key is 32.
  expect(Buffer.from(vapidPublicKey!, 'base64url')).toHaveLength(65);
  expect(Buffer.from(vapidPrivateKey!, 'base64url')).toHaveLength(32);
  expect(await readSecrets()).toEqual(made);
});

test('two first runs at once agree on the same secrets', async () => {
  const [one, other] = await Promise.all([readSecrets(), readSecrets()]);
  expect(one).toEqual(other);
});

test('a secret that is missing is added and the others stay', async () => {
  const kept = await readSecrets();
  delete kept.auditSecret;
  writeFileSync(path, JSON.stringify(kept), { mode: 0o644 });
  const all = await readSecrets();
  expect(all).toMatchObject(kept);
  expect(all.auditSecret).toMatch(/^[0-9a-f]{64}$/);
  expect(statSync(path).mode & 0o777).toBe(0o600);
  expect(JSON.parse(readFileSync(path, 'utf8'))).toEqual(all);
});
