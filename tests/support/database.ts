import { createHash, randomUUID } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { pino } from 'pino';
import { closePools, openPools, type Pools } from '#server/db/pools.ts';
import { migrateDatabase } from '#server/db/migrations.ts';

const migrationsFolder = fileURLToPath(new URL('../../drizzle', import.meta.url));
const passwords = { app: 'test-app', gate: 'test-gate' };
const owner = { name: 'espalier_test_owner', password: 'test-owner' };
export const silentLog = pino({ level: 'silent' });

const urlFor = (superUrl: string, database: string, user?: { name: string; password: string }): string => {
  const url = new URL(superUrl);
  url.pathname = `/${database}`;
  if (user) {
    url.username = user.name;
    url.password = user.password;
  }
  return url.href;
};

/** The template's name changes with the migrations and queues, so a kept cluster never serves an old schema. */
const templateName = (): string => {
  const hash = createHash('sha256');
  for (const file of readdirSync(migrationsFolder).sort()) {
    if (file.endsWith('.sql')) hash.update(readFileSync(join(migrationsFolder, file)));
  }
  hash.update(readFileSync(fileURLToPath(new URL('../../server/jobs/queues.ts', import.meta.url))));
  return `espalier_template_${hash.digest('hex').slice(0, 12)}`;
};

const asSuper = async <T>(superUrl: string, run: (client: pg.Client) => Promise<T>): Promise<T> => {
  const client = new pg.Client({ connectionString: superUrl });
  await client.connect();
  try {
    return await run(client);
  } finally {
    await client.end();
  }
};

/** Makes the migrated database that every test file clones; nothing where it is there already. */
export const prepareTemplate = (superUrl: string): Promise<void> =>
  asSuper(superUrl, async (client) => {
    const name = templateName();
    const { rowCount } = await client.query(
      'select 1 from pg_database where datname = $1 and datistemplate',
      [name],
    );
    if (rowCount === 1) return;
    await client.query(`drop database if exists ${name}`);
    const { rowCount: hasSuperuser } = await client.query('select 1 from pg_roles where rolname = $1', [
      owner.name,
    ]);
    if (hasSuperuser === 0)
      await client.query(`create role ${owner.name} login createrole password '${owner.password}'`);
    await client.query(`create database ${name} owner ${owner.name}`);
    await migrateDatabase(urlFor(superUrl, name, owner), passwords, migrationsFolder);
    await client.query(`alter database ${name} is_template true`);
  });

export type TestDatabase = {
  pools: Pools;
  /** The superuser's pool, for what a test plants or looks at behind the fence. */
  asSuperuser: pg.Pool;
  urls: { app: string; gate: string; owner: string };
  drop: () => Promise<void>;
};

/** A database of one's own, cloned from the template. The super pool passes the fence; the product's do not. */
export const cloneDatabase = async (): Promise<TestDatabase> => {
  const superUrl = process.env.TEST_SUPER_URL;
  if (!superUrl) throw new Error('The integration tests need TEST_SUPER_URL, set by their global setup.');
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  await asSuper(superUrl, (client) =>
    client.query(`create database ${name} template ${templateName()} owner ${owner.name}`),
  );
  const urls = {
    app: urlFor(superUrl, name, { name: 'espalier_app', password: passwords.app }),
    gate: urlFor(superUrl, name, { name: 'espalier_gate', password: passwords.gate }),
    owner: urlFor(superUrl, name, owner),
  };
  const pools = openPools(urls, silentLog);
  const asSuperuser = new pg.Pool({ connectionString: urlFor(superUrl, name), max: 3 });
  return {
    pools,
    asSuperuser,
    urls,
    drop: async () => {
      await closePools(pools);
      await asSuperuser.end();
      await asSuper(superUrl, (client) => client.query(`drop database ${name} with (force)`));
    },
  };
};
