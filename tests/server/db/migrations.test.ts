import { randomUUID } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { migrateDatabase } from '#server/db/migrations.ts';
import { assertSafeServer, closePools, openPools } from '#server/db/pools.ts';
import { queueOptions } from '#server/jobs/queues.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';

const folder = fileURLToPath(new URL('../../../drizzle', import.meta.url));

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(async () => {
  await database.drop();
});

const passwords = () => ({
  app: new URL(database.urls.app).password,
  gate: new URL(database.urls.gate).password,
});

/** What is there after migrating, as far as a second run could change it. */
const stateOf = async (client: pg.ClientBase) => {
  const tables = await client.query(
    `select schemaname, tablename, rowsecurity from pg_tables where schemaname in ('public', 'jobs', 'drizzle') order by 1, 2`,
  );
  const policies = await client.query('select tablename, policyname, qual from pg_policies order by 1, 2');
  const grants = await client.query(
    `select relname, relacl::text from pg_class where relnamespace in ('public'::regnamespace, 'jobs'::regnamespace) and relkind in ('r', 'p') order by 1`,
  );
  const applied = await client.query('select hash from drizzle.__drizzle_migrations order by id');
  const queues = await client.query('select name, retry_limit, expire_seconds from jobs.queue order by 1');
  return [tables, policies, grants, applied, queues].map(({ rows }) => rows as unknown[]);
};

describe('migrating', () => {
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  let superClient: pg.Client;
  let ownerUrl: string;

  beforeAll(async () => {
    superClient = new pg.Client({ connectionString: process.env.TEST_SUPER_URL });
    await superClient.connect();
    const owner = new URL(database.urls.owner);
    await superClient.query(`create database ${name} owner ${owner.username}`);
    owner.pathname = `/${name}`;
    ownerUrl = owner.href;
  });

  afterAll(async () => {
    await superClient.query(`drop database ${name} with (force)`);
    await superClient.end();
  });

  it('works when two processes start at once, and changes nothing when it is run again', async () => {
    const migrate = () => migrateDatabase(ownerUrl, passwords(), folder);
    await Promise.all([migrate(), migrate()]);
    const client = new pg.Client({ connectionString: ownerUrl });
    await client.connect();
    try {
      const once = await stateOf(client);
      const queues = once.at(-1) as { name: string }[];
      expect(queues.map((queue) => queue.name)).toEqual(expect.arrayContaining(Object.keys(queueOptions)));
      await migrate();
      expect(await stateOf(client)).toEqual(once);
    } finally {
      await client.end();
    }
  });
});

describe('starting', () => {
  const check = async (app: string) => {
    const pools = openPools({ app, gate: database.urls.gate }, silentLog);
    try {
      await assertSafeServer(pools);
    } finally {
      await closePools(pools);
    }
  };

  it('goes ahead with the role of the application', async () => {
    await expect(check(database.urls.app)).resolves.toBeUndefined();
  });

  it('refuses a server that answers before a write is durable', async () => {
    const url = new URL(database.urls.app);
    const { username } = url;
    const inDatabase = `in database "${url.pathname.slice(1)}"`;
    await database.asSuperuser.query(`alter role ${username} ${inDatabase} set synchronous_commit = off`);
    try {
      await expect(check(url.href)).rejects.toThrow('set synchronous_commit to on');
    } finally {
      await database.asSuperuser.query(`alter role ${username} ${inDatabase} reset synchronous_commit`);
    }
  });

  it.each(['bypassrls', 'superuser'])('refuses a role with %s', async (power) => {
    const role = `test_${randomUUID().slice(0, 8)}`;
    await database.asSuperuser.query(`create role ${role} login ${power} password 'test'`);
    const url = new URL(database.urls.app);
    url.username = role;
    url.password = 'test';
    try {
      await expect(check(url.href)).rejects.toThrow('passes row security');
    } finally {
      await database.asSuperuser.query(`drop role ${role}`);
    }
  });

  it('refuses the owner of the tables, who could take row security away', async () => {
    await expect(check(database.urls.owner)).rejects.toThrow('passes row security');
  });
});
