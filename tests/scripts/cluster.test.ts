import { spawn } from 'node:child_process';
import { chmodSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { afterAll, afterEach, beforeAll, expect, test, vi } from 'vitest';
import type * as ClusterScripts from '../../scripts/cluster.mjs';

const asRoot = process.getuid?.() === 0;
let local: string;
let scripts: typeof ClusterScripts;
let running: ClusterScripts.Cluster | null = null;

/** The scripts read their place once, so they are loaded after it is set. */
async function load(folder: string): Promise<typeof ClusterScripts> {
  vi.resetModules();
  vi.stubEnv('ESPALIER_LOCAL', folder);
  return import('../../scripts/cluster.mjs');
}

async function start(): Promise<ClusterScripts.Cluster> {
  running = await scripts.startCluster();
  return running;
}

async function ask(url: string, sql: string): Promise<Record<string, unknown>> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query<Record<string, unknown>>(sql);
    return rows[0] ?? {};
  } finally {
    await client.end();
  }
}

const portOf = (url: string): number => Number(new URL(url).port);

beforeAll(async () => {
  local = mkdtempSync(join(tmpdir(), 'espalier-cluster-'));
  chmodSync(local, 0o755);
  scripts = await load(local);
});

afterEach(async () => {
  await running?.stop();
  running = null;
});

afterAll(() => {
  rmSync(local, { recursive: true });
});

test('the cluster runs in UTC with checksums, its write-ahead log durable before each answer', async () => {
  const { superUrl } = await start();
  const sql = `select current_setting('TimeZone') as zone, current_setting('synchronous_commit') as commit,
    current_setting('fsync') as fsync, current_setting('data_checksums') as checksums,
    current_setting('listen_addresses') as listens, current_setting('unix_socket_directories') as sockets,
    current_setting('password_encryption') as passwords, pg_encoding_to_char(encoding) as encoding, datcollate
    from pg_database where datname = 'espalier'`;
  expect(await ask(superUrl, sql)).toEqual({
    zone: 'UTC',
    commit: 'on',
    fsync: 'on',
    checksums: 'on',
    listens: '127.0.0.1',
    sockets: '',
    passwords: 'scram-sha-256',
    encoding: 'UTF8',
    datcollate: 'C.UTF-8',
  });
});

test('the owner owns its database, is no superuser and cannot pass row security', async () => {
  const { ownerUrl } = await start();
  const sql = `select rolname, rolsuper, rolbypassrls, rolcreatedb, pg_get_userbyid(datdba) as owner
    from pg_roles, pg_database where rolname = current_user and datname = current_database()`;
  expect(await ask(ownerUrl, sql)).toEqual({
    rolname: 'espalier_owner',
    rolsuper: false,
    rolbypassrls: false,
    rolcreatedb: false,
    owner: 'espalier_owner',
  });
});

test('nobody comes in without the password, not even the superuser on this machine', async () => {
  const { superUrl } = await start();
  const wrong = Object.assign(new URL(superUrl), { password: 'wrong' }).href;
  // 28P01 is invalid_password (PostgreSQL, appendix A).
  await expect(ask(wrong, 'select 1')).rejects.toMatchObject({ code: '28P01' });
});

test('after kill -9 of the server the next start has the committed data, on the same port', async () => {
  const first = await start();
  await ask(first.ownerUrl, 'create table kept as select 41 + 1 as answer');
  process.kill(first.pid, 'SIGKILL');
  await first.exited;
  const second = await start();
  expect(await ask(second.ownerUrl, 'select answer from kept')).toEqual({ answer: 42 });
  expect(portOf(second.superUrl)).toBe(portOf(first.superUrl));
});

test('a server that an earlier run left behind is ended by the next start', async () => {
  const left = await start();
  const next = await start();
  expect(await left.exited).toBe('exit code 0');
  expect(await ask(next.superUrl, 'select 1 as one')).toEqual({ one: 1 });
});

test("a pid file that names a stranger's process, as after a reboot, does not keep the server from starting", async () => {
  const first = await start();
  const pidFile = join(local, 'cluster/data/postmaster.pid');
  const content = readFileSync(pidFile, 'utf8');
  await first.stop();
  const stranger = spawn('sleep', ['60']);
  try {
    writeFileSync(pidFile, content.replace(/^\d+/, String(stranger.pid)));
    const second = await start();
    expect(await ask(second.superUrl, 'select 1 as one')).toEqual({ one: 1 });
    expect(stranger.exitCode).toBeNull();
  } finally {
    stranger.kill();
  }
});

test('another port is chosen only when somebody else has the kept one', async () => {
  const first = await start();
  const kept = portOf(first.superUrl);
  // Ports from 32768 on belong to outgoing connections (Linux, ip_local_port_range).
  expect(kept).toBeLessThan(32_768);
  await first.stop();
  const taker = createServer();
  await new Promise<void>((resolve) => taker.listen(kept, '127.0.0.1', resolve));
  try {
    expect(portOf((await start()).superUrl)).not.toBe(kept);
  } finally {
    taker.close();
  }
});

test("a checkout that PostgreSQL's account cannot reach keeps its cluster under /var/tmp, named by its clone", async () => {
  const closed = mkdtempSync(join(tmpdir(), 'espalier-closed-'));
  chmodSync(closed, 0o700);
  const { clusterFolder } = await load(join(closed, 'local'));
  const folder = clusterFolder('cluster');
  try {
    // Only root hands the server to another account; anybody else runs it in the checkout.
    expect(folder).toMatch(asRoot ? /^\/var\/tmp\/espalier-[0-9a-f]{12}\/cluster$/ : /\/local\/cluster$/);
    expect(clusterFolder('cluster')).toBe(folder);
  } finally {
    rmSync(closed, { recursive: true });
    if (asRoot) rmSync(join(folder, '..'), { recursive: true });
  }
});
