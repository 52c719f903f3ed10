import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { lock, tryLock } from '../../scripts/lock.mjs';

let folder: string;
let path: string;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'espalier-lock-'));
  path = join(folder, 'a.lock');
});

afterEach(() => {
  rmSync(folder, { recursive: true });
});

test('a held lock names its holder and is free again after its release', () => {
  const first = tryLock(path);
  expect(tryLock(path)).toEqual({ heldBy: process.pid });
  if ('release' in first) first.release();
  expect(tryLock(path)).toHaveProperty('release');
});

test('the lock of a process that is gone is taken over', () => {
  const script = `import('${join(import.meta.dirname, '../../scripts/lock.mjs')}').then((m) => m.tryLock('${path}'))`;
  expect(spawnSync(process.execPath, ['-e', script]).status).toBe(0);
  expect(readdirSync(folder)).toEqual(['a.lock']);
  expect(tryLock(path)).toHaveProperty('release');
});

test('a process that got the pid of a dead holder does not keep its lock', () => {
  writeFileSync(path, JSON.stringify({ pid: process.pid, birth: 'another boot 1' }));
  expect(tryLock(path)).toHaveProperty('release');
});

test('who waits for a lock is told once and gets it at its release', async () => {
  const release = await lock(path, () => undefined);
  const told = vi.fn();
  const waiting = lock(path, told);
  await vi.waitFor(() => expect(told).toHaveBeenCalledExactlyOnceWith(process.pid));
  release();
  (await waiting)();
  expect(readdirSync(folder)).toEqual([]);
});
