import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join, relative } from 'node:path';
import { root } from './places.mjs';

/** All that a build depends on. */
const SOURCES = [
  'src',
  'server',
  'shared',
  'workers',
  'public',
  'index.html',
  'vite.config.ts',
  'tailwind.config.ts',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
  'scripts/build.mjs',
  'scripts/sources.mjs',
];

/** The files at or below a path, in the same order on every machine. */
export function* filesBelow(path) {
  if (!existsSync(path)) return;
  if (statSync(path).isFile()) {
    yield path;
    return;
  }
  for (const name of readdirSync(path).sort()) yield* filesBelow(join(path, name));
}

/** Names this state of the sources; the same sources have the same id on every machine. */
export function sourcesId() {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesBelow(join(root, source))) {
      const content = readFileSync(file);
      hash.update(`${relative(root, file)}\0${content.length}\0`).update(content);
    }
  }
  return hash.digest('hex').slice(0, 16);
}

/** The id of what `dist/` holds, or null when there is no finished build. */
export function builtId() {
  try {
    return JSON.parse(readFileSync(join(root, 'dist/build.json'), 'utf8')).buildId;
  } catch {
    return null;
  }
}
