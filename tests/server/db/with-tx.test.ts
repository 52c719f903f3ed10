import { sql } from 'drizzle-orm';
import pg from 'pg';
import { afterAll, afterEach, beforeAll, beforeEach, expect, it } from 'vitest';
import { withTx } from '#server/db/with-tx.ts';
import { openPools, type Pools } from '#server/db/pools.ts';
import { makeClinic } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';

let database: TestDatabase;
let clinicId: string;
let pools: Pools;
const anonymous = { kind: 'anonymous' } as const;

beforeAll(async () => {
  database = await cloneDatabase();
  clinicId = await makeClinic(database);
  // A row that is fine when it is written and refused when the transaction commits.
  await database.asSuperuser.query(`
    create table late_refusals (id int);
    create function refuse_late() returns trigger language plpgsql as $$ begin raise 'refused late'; end $$;
    create constraint trigger refuse_late after insert on late_refusals
      deferrable initially deferred for each row execute function refuse_late();
    grant insert, select on late_refusals to espalier_app;
    create table notes (id int);
    grant insert, select on notes to espalier_app;
  `);
});

afterAll(async () => {
  await database.drop();
});

beforeEach(() => {
  pools = openPools(database.urls, silentLog);
});

afterEach(async () => {
  await Promise.all([pools.app.end(), pools.gate.end()]);
});

/** Every client is back: none is lent out, nobody waits, and the next transaction is served. */
const expectNoLeak = async () => {
  expect(pools.app.totalCount - pools.app.idleCount).toBe(0);
  expect(pools.app.waitingCount).toBe(0);
  const { rows } = await withTx(pools.app, anonymous, (tx) => tx.$client.query('select 1 as one'));
  expect(rows).toEqual([{ one: 1 }]);
};

/** The database ends the connection, and this side has heard of it. */
const endConnection = async (client: pg.ClientBase): Promise<void> => {
  const { rows } = await client.query<{ pid: number }>('select pg_backend_pid() as pid');
  const ended = new Promise<void>((resolve) => client.once('end', () => resolve()));
  await database.asSuperuser.query('select pg_terminate_backend($1)', [rows[0]!.pid]);
  await ended;
};

const times = 50;
/** A new connection takes its time; one leaked client each would use up the pool's ten all the same. */
const timesSevered = 15;

it('gives the client back when the transaction cannot even begin', async () => {
  const real = pools.app;
  // The real pool and a real connection, which the database has ended just before BEGIN.
  const severing = Object.assign(Object.create(real) as pg.Pool, {
    connect: async () => {
      const client = await real.connect();
      client.on('error', () => undefined);
      await endConnection(client);
      return client;
    },
  });
  let ran = 0;
  for (let i = 0; i < timesSevered; i += 1) {
    const failing = withTx(severing, anonymous, async () => {
      ran += 1;
    });
    await expect(failing).rejects.toThrow();
  }
  expect(ran).toBe(0);
  await expectNoLeak();
});

it('gives the client back and keeps nothing when what it runs throws', async () => {
  for (let i = 0; i < times; i += 1) {
    const failing = withTx(pools.app, anonymous, async (tx) => {
      await tx.execute(sql`insert into notes values (1)`);
      throw new Error('handler');
    });
    await expect(failing).rejects.toThrow('handler');
  }
  await expectNoLeak();
  expect((await pools.app.query('select from notes')).rowCount).toBe(0);
});

it('gives the client back and reports the failure when the commit is refused', async () => {
  for (let i = 0; i < times; i += 1) {
    const failing = withTx(pools.app, anonymous, async (tx) => {
      await tx.execute(sql`insert into late_refusals values (${i})`);
      return 'done';
    });
    await expect(failing).rejects.toThrow('refused late');
  }
  await expectNoLeak();
  expect((await pools.app.query('select from late_refusals')).rowCount).toBe(0);
});

it('gives the client back when the database ends the connection in the middle', async () => {
  for (let i = 0; i < timesSevered; i += 1) {
    const failing = withTx(pools.app, anonymous, async (tx) => {
      await endConnection(tx.$client);
      await tx.execute(sql`select 1`);
    });
    await expect(failing).rejects.toThrow();
  }
  await expectNoLeak();
});

it('gives the client back when the connection ends between the last statement and the commit', async () => {
  for (let i = 0; i < timesSevered; i += 1) {
    const failing = withTx(pools.app, anonymous, async (tx) => {
      await tx.execute(sql`insert into notes values (2)`);
      await endConnection(tx.$client);
      return 'done';
    });
    await expect(failing).rejects.toThrow();
  }
  await expectNoLeak();
  expect((await pools.app.query('select from notes')).rowCount).toBe(0);
});

it('never calls a transaction done whose commit the database turned into a rollback', async () => {
  const swallowing = withTx(pools.app, anonymous, async (tx) => {
    await tx.execute(sql`insert into notes values (3)`);
    await tx.execute(sql`select 1 / 0`).catch(() => undefined);
    return 'done';
  });
  await expect(swallowing).rejects.toThrow();
  await expectNoLeak();
});

it('says who acts to the transaction alone: no setting outlives it', async () => {
  const one = new pg.Pool({ connectionString: database.urls.app, max: 1 });
  const settings = `select current_setting('app.clinic_id', true) as clinic,
    current_setting('app.actor_kind', true) as kind, current_setting('app.person_id', true) as person`;
  const personId = crypto.randomUUID();
  const inside = await withTx(one, { kind: 'person', clinicId, personId }, (tx) =>
    tx.$client.query(settings),
  );
  expect(inside.rows).toEqual([{ clinic: clinicId, kind: 'person', person: personId }]);
  const after = await one.query(settings);
  expect(after.rows).toEqual([{ clinic: '', kind: '', person: '' }]);
  await one.end();
});

it('keeps what was written once it has answered', async () => {
  await withTx(pools.app, anonymous, (tx) => tx.execute(sql`insert into notes values (4)`));
  expect((await database.asSuperuser.query('select id from notes where id = 4')).rowCount).toBe(1);
});
