import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ActingAs } from '#server/db/actor.ts';
import { withTx } from '#server/db/with-tx.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { fencedTables, plantWholeClinic, type WholeClinic } from '../whole-clinic.ts';

let database: TestDatabase;
let here: WholeClinic;
let there: WholeClinic;
let somebodyHere: ActingAs;

beforeAll(async () => {
  database = await cloneDatabase();
  here = await plantWholeClinic(database);
  there = await plantWholeClinic(database);
  somebodyHere = { kind: 'person', clinicId: here.clinicId, personId: here.therapist.personId };
});

afterAll(async () => {
  await database.drop();
});

const asHere = (text: string, values: unknown[] = []) =>
  withTx(database.pools.app, somebodyHere, (tx) => tx.$client.query(text, values));
const asNobody = (text: string, values: unknown[] = []) =>
  withTx(database.pools.app, { kind: 'anonymous' }, (tx) => tx.$client.query(text, values));

const insertable = [
  ...(['check_ins', 'alerts', 'alert_mistakes', 'flags', 'findings', 'flag_events'] as const),
  ...(['threads', 'messages', 'thread_participants', 'notifications', 'audit_entries'] as const),
  ...(['people', 'person_roles', 'patients', 'operation_cards', 'care_team_members', 'plans'] as const),
  ...(['patient_state_changes', 'chart_openings', 'caregivers', 'invitations', 'two_person_acts'] as const),
  ...(['notification_settings', 'push_subscriptions'] as const),
];
const updatable: [table: string, column: string][] = [
  ['check_ins', 'evaluated_at = now()'],
  ['alerts', 'evaluated_at = now()'],
  ['flags', `state = 'open'`],
  ['findings', `urgency = 'routine'`],
  ['threads', `state = 'closed'`],
  ['thread_participants', 'seen_sequence = 99'],
  ['notifications', `state = 'failed'`],
  ['notification_settings', 'enabled = true'],
  ['push_subscriptions', `device_name = 'another'`],
  ['people', `name = 'Another'`],
  ['person_roles', `role = role`],
  ['patients', `state = 'paused'`],
  ['operation_cards', `surgeon = 'Another'`],
  ['care_team_members', 'is_lead = false'],
  ['caregivers', 'may_check_in = false'],
  ['invitations', 'revoked_at = now()'],
  ['two_person_acts', `state = 'refused'`],
];

/** A row of the other clinic as a new one, in a shape that goes into its own table again. */
const copyOfTheirs = async (table: string): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ row: Record<string, unknown> }>(
    `select to_jsonb(t) as row from ${table} t where clinic_id = $1 limit 1`,
    [there.clinicId],
  );
  return JSON.stringify({ ...rows[0]!.row, id: randomUUID() });
};
const insertCopy = (table: string) =>
  `insert into ${table} select * from jsonb_populate_record(null::${table}, $1::jsonb)`;

describe('as somebody of a clinic', () => {
  it.each(fencedTables)('no row of another clinic can be read from %s', async (table) => {
    const { rows } = await asHere(`select distinct clinic_id from ${table}`);
    expect(rows).toEqual([{ clinic_id: here.clinicId }]);
    expect((await asHere(`select 1 from ${table} where clinic_id = $1`, [there.clinicId])).rows).toEqual([]);
  });

  it('no other clinic can be read', async () => {
    expect((await asHere('select id from clinics')).rows).toEqual([{ id: here.clinicId }]);
  });

  it.each(insertable)('no row can be put into %s of another clinic', async (table) => {
    await expect(asHere(insertCopy(table), [await copyOfTheirs(table)])).rejects.toThrow(
      `new row violates row-level security policy for table "${table}"`,
    );
  });

  it.each(updatable)('no row of another clinic can be changed in %s', async (table, change) => {
    const { rowCount } = await asHere(`update ${table} set ${change} where clinic_id = $1`, [there.clinicId]);
    expect(rowCount).toBe(0);
    expect((await asHere(`update ${table} set ${change}`)).rowCount).toBeGreaterThan(0);
  });

  it.each([
    ...['flags', 'findings', 'threads', 'thread_participants', 'notifications', 'notification_settings'],
    ...['push_subscriptions', 'people', 'patients', 'caregivers', 'invitations', 'two_person_acts'],
  ])('no row of %s can be moved into another clinic', async (table) => {
    await expect(asHere(`update ${table} set clinic_id = $1`, [there.clinicId])).rejects.toThrow(
      'violates row-level security policy',
    );
  });

  it('no row can refer to a row of another clinic, although keys pass row security', async () => {
    await expect(
      asHere(`insert into flag_events (clinic_id, flag_id, kind, at) values ($1, $2, 'seen', now())`, [
        here.clinicId,
        there.flagId,
      ]),
    ).rejects.toThrow('violates foreign key constraint');
  });
});

describe('as nobody', () => {
  it.each(fencedTables)('nothing can be read from %s', async (table) => {
    expect((await asNobody(`select 1 from ${table}`)).rows).toEqual([]);
  });

  it.each(insertable)('nothing can be put into %s', async (table) => {
    await expect(asNobody(insertCopy(table), [await copyOfTheirs(table)])).rejects.toThrow(
      'violates row-level security policy',
    );
  });

  it.each(updatable)('nothing can be changed in %s', async (table, change) => {
    expect((await asNobody(`update ${table} set ${change}`)).rowCount).toBe(0);
  });
});

describe('on a connection that served somebody before', () => {
  let pool: pg.Pool;
  const rowsSeen = async (run: (text: string) => Promise<pg.QueryResult>) =>
    (await run('select clinic_id from patients')).rows as unknown[];

  beforeAll(() => {
    pool = new pg.Pool({ connectionString: database.urls.app, max: 1 });
  });

  afterAll(async () => {
    await pool.end();
  });

  it('nobody, and a query outside of any transaction, see nothing', async () => {
    const as = (actor: ActingAs) => (text: string) => withTx(pool, actor, (tx) => tx.$client.query(text));
    expect(await rowsSeen(as(somebodyHere))).toEqual([{ clinic_id: here.clinicId }]);
    expect(await rowsSeen((text) => pool.query(text))).toEqual([]);
    expect(await rowsSeen(as({ kind: 'anonymous' }))).toEqual([]);
    expect(await rowsSeen(as({ kind: 'system', clinicId: there.clinicId }))).toEqual([
      { clinic_id: there.clinicId },
    ]);
    expect(await rowsSeen(as(somebodyHere))).toEqual([{ clinic_id: here.clinicId }]);
  });

  it('nobody sees anything after a transaction that failed', async () => {
    const failing = withTx(pool, somebodyHere, (tx) => tx.$client.query('select 1 / 0'));
    await expect(failing).rejects.toThrow('division by zero');
    expect(await rowsSeen((text) => pool.query(text))).toEqual([]);
  });
});
