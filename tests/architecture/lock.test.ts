import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { root } from '../../scripts/places.mjs';

type Dependencies = Record<string, string>;
type Manifest = { dependencies: Dependencies; devDependencies: Dependencies };

const read = (name: string): Promise<string> => readFile(join(root, name), 'utf8');

const manifest = JSON.parse(await read('package.json')) as Manifest;
const lockText = await read('package-lock.json');
const lock = JSON.parse(lockText) as { packages: Record<string, Partial<Manifest> & { version?: string }> };

it('holds no address in the lock, so that it installs from whatever registry a machine uses', () => {
  expect(lockText.match(/"resolved":/g) ?? []).toEqual([]);
  expect(lockText.match(/https?:\/\/[^"]*\.tgz/g) ?? []).toEqual([]);
});

it('keeps npm from writing addresses and ranges', async () => {
  const lines = (await read('.npmrc')).split('\n');
  expect(lines).toContain('save-exact=true');
  expect(lines).toContain('omit-lockfile-registry-resolved=true');
});

it('names every package by one exact version', () => {
  const named = Object.entries({ ...manifest.dependencies, ...manifest.devDependencies });
  expect(named.length).toBeGreaterThan(30);
  expect(named.filter(([, version]) => !/^\d+\.\d+\.\d+$/.test(version))).toEqual([]);
});

it('locks the versions that package.json names', () => {
  const top = lock.packages[''];
  expect(top?.dependencies).toEqual(manifest.dependencies);
  expect(top?.devDependencies).toEqual(manifest.devDependencies);
  for (const [name, version] of Object.entries({ ...manifest.dependencies, ...manifest.devDependencies })) {
    expect(lock.packages[`node_modules/${name}`]?.version, name).toBe(version);
  }
});

it('names no package twice, for production and for development', () => {
  expect(Object.keys(manifest.dependencies).filter((name) => name in manifest.devDependencies)).toEqual([]);
});
