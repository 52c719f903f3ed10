import { mkdirSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. Every part of the product runs with it as its working folder. */
export const root = dirname(dirname(fileURLToPath(import.meta.url)));

/** What this checkout keeps for itself: cluster, secrets, logs, mails. ESPALIER_LOCAL puts it elsewhere. */
export const local = resolve(root, process.env.ESPALIER_LOCAL ?? '.local');

/** A folder below `.local/`, made when missing. */
export function localFolder(...names) {
  const folder = join(local, ...names);
  mkdirSync(folder, { recursive: true });
  return folder;
}
