import { createECDH, randomBytes } from 'node:crypto';
import { chmodSync, linkSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { localFolder } from './places.mjs';
import { Stop } from './say.mjs';

const NAMES = [
  'superPassword',
  'ownerPassword',
  'appPassword',
  'gatePassword',
  'sessionSecret',
  'auditSecret',
  'tokenSecret',
  'sealSecret',
  'gatewayToken',
];

/** A key pair by which browsers know this server for push (RFC 8292): P-256, base64url. */
function vapidKeys() {
  const pair = createECDH('prime256v1');
  pair.generateKeys();
  // A private key may begin with zeros, which Node leaves out.
  const privateKey = Buffer.concat([Buffer.alloc(32), pair.getPrivateKey()]).subarray(-32);
  return {
    vapidPublicKey: pair.getPublicKey('base64url'),
    vapidPrivateKey: privateKey.toString('base64url'),
  };
}

/**
 * The secrets of this checkout, made once and readable by its user alone.
 * Only letters and digits, so they fit into addresses and SQL unquoted. A secret that a newer version needs is added.
 */
export function secrets() {
  const path = join(localFolder(), 'secrets.json');
  let kept = {};
  try {
    kept = JSON.parse(readFileSync(path, 'utf8'));
    chmodSync(path, 0o600);
  } catch (error) {
    if (error instanceof SyntaxError) throw new Stop(`${path} is not readable JSON; restore it from a copy.`);
    if (error.code !== 'ENOENT') throw error;
  }
  const missing = NAMES.filter((name) => !kept[name]);
  if (missing.length === 0 && kept.vapidPublicKey) return kept;
  const made = {
    ...Object.fromEntries(missing.map((name) => [name, randomBytes(32).toString('hex')])),
    ...(kept.vapidPublicKey ? {} : vapidKeys()),
  };
  const all = { ...kept, ...made };
  const draft = `${path}.${process.pid}`;
  writeFileSync(draft, `${JSON.stringify(all, null, 2)}\n`, { mode: 0o600 });
  if (Object.keys(kept).length > 0) {
    renameSync(draft, path);
    return all;
  }
  try {
    // Of two first runs at once, one makes the file and the other reads it.
    linkSync(draft, path);
    return all;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
    return secrets();
  } finally {
    rmSync(draft);
  }
}
