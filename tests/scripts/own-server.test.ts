import { chmodSync, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import type { Cluster } from '../../scripts/cluster.mjs';
import { freePort } from '../../scripts/ports.mjs';
import { launchProduct } from '../support/product.ts';

let folder: string;
let server: Cluster;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'espalier-server-'));
  chmodSync(folder, 0o755);
  // The scripts read their place once, so they are loaded after it is set.
  vi.resetModules();
  vi.stubEnv('ESPALIER_LOCAL', folder);
  const { startCluster } = await import('../../scripts/cluster.mjs');
  server = await startCluster({ name: 'server', unsafe: true });
});

afterAll(async () => {
  await server.stop();
  rmSync(folder, { recursive: true });
});

test('with DATABASE_URL and without the demo there is no cluster, no invented person, no fake and no outbox', async () => {
  const port = await freePort();
  const smtpUrl = 'smtp://127.0.0.1:25';
  const env = { DATABASE_URL: server.ownerUrl, DEMO: 'off', SMTP_URL: smtpUrl };
  const launch = await launchProduct(port, { env });
  const client = new pg.Client({ connectionString: server.superUrl.replace(/\/postgres$/, '/espalier') });
  try {
    expect(await launch.says('Espalier is ready at ')).toBe(`Espalier is ready at http://localhost:${port}`);
    expect((await fetch(`http://localhost:${port}/readyz`)).status).toBe(200);
    // The address is the client's then, which knows no such page.
    expect(await (await fetch(`http://localhost:${port}/outbox`)).text()).not.toContain('Outbox');
    expect(existsSync(join(launch.local, 'cluster'))).toBe(false);
    await client.connect();
    const { rows } = await client.query('select count(*)::int as clinics from clinics');
    expect(rows).toEqual([{ clinics: 0 }]);
    const { rows: apps } = await client.query(
      "select distinct usename from pg_stat_activity where datname = 'espalier' and usename like 'espalier_%' order by 1",
    );
    // The superuser is this test; the product runs as its two roles and never as the owner.
    expect(apps).toEqual(['espalier_app', 'espalier_gate', 'espalier_super'].map((usename) => ({ usename })));
  } finally {
    await client.end();
    expect(await launch.stop()).toBe(0);
  }
  expect(launch.output()).not.toContain('Outbox');
  expect(launch.output()).not.toContain('Demo accounts');
  // With DATABASE_URL the server is not ours to end.
  expect(launch.output().split('\n').slice(-4)).toEqual([
    'Ending …',
    '  web …',
    '  worker …',
    'Espalier has ended.',
  ]);
}, 240_000);
