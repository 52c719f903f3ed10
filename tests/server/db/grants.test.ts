import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { gateTables } from './gate-tables.ts';

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(() => database.drop());

const read = async <T extends Record<string, unknown>>(text: string, values: unknown[] = []): Promise<T[]> =>
  (await database.asSuperuser.query<T>(text, values)).rows;

const one = async <T>(text: string): Promise<T[]> =>
  (await read<{ value: T }>(text)).map(({ value }) => value);

const rightsOf = async (role: string): Promise<Record<string, string>> => {
  const rows = await read<{ table: string; rights: string }>(
    `select t.tablename::text as table, string_agg(right_, ' ' order by right_) as rights
     from pg_tables t, unnest(array['select', 'insert', 'update', 'delete', 'truncate', 'references', 'trigger']) right_
     where t.schemaname = 'public' and has_table_privilege($1, 'public.' || t.tablename, right_)
     group by 1`,
    [role],
  );
  return Object.fromEntries(rows.map(({ table, rights }) => [table, rights]));
};

/** Rights to single columns, where there is none to the whole table. */
const columnsOf = (role: string, right: string) =>
  one<string>(
    `select t.relname || '.' || c.attname as value
     from pg_class t join pg_attribute c on c.attrelid = t.oid and c.attnum > 0 and not c.attisdropped
     where t.relnamespace = 'public'::regnamespace and t.relkind = 'r'
       and has_column_privilege('${role}', t.oid, c.attnum, '${right}')
       and not has_table_privilege('${role}', t.oid, '${right}')
     order by 1`,
  );

describe('grants', () => {
  it('let the application read, add, and change only what has a state', async () => {
    expect(await rightsOf('espalier_app')).toEqual({
      alert_mistakes: 'insert select',
      alerts: 'insert select',
      audit_entries: 'insert select',
      care_team_members: 'delete insert select update',
      caregivers: 'insert select update',
      chart_openings: 'insert select',
      check_ins: 'insert select',
      clinics: 'select',
      findings: 'insert select update',
      flag_events: 'insert select',
      flags: 'insert select update',
      invitations: 'insert select update',
      messages: 'insert select',
      notification_settings: 'delete insert select update',
      notifications: 'insert select update',
      operation_cards: 'insert select update',
      patient_state_changes: 'insert select',
      patients: 'insert select update',
      people: 'insert select update',
      person_roles: 'delete insert select update',
      plans: 'insert select',
      push_subscriptions: 'delete insert select update',
      sign_offs: 'select',
      thread_participants: 'insert select update',
      threads: 'insert select update',
      two_person_acts: 'insert select update',
    });
  });

  it('let nothing of a check-in or an alert be changed but when it was evaluated', async () => {
    expect(await columnsOf('espalier_app', 'update')).toEqual([
      'alerts.evaluated_at',
      'check_ins.evaluated_at',
    ]);
  });

  it('let the gate use its own tables and see none of a clinic', async () => {
    const everything = 'delete insert select update';
    expect(await rightsOf('espalier_gate')).toEqual(
      Object.fromEntries(gateTables.map((table) => [table, everything])),
    );
    expect(await columnsOf('espalier_gate', 'select')).toEqual([]);
    await expect(database.pools.gate.query('select 1 from patients')).rejects.toThrow('permission denied');
    await expect(database.pools.gate.query('select 1 from jobs.job')).rejects.toThrow('permission denied');
  });

  it.each(gateTables)('let the application see nothing of the gate: %s', async (table) => {
    await expect(database.pools.app.query(`select 1 from ${table}`)).rejects.toThrow('permission denied');
  });

  it('let the finder read ids and times only', async () => {
    expect(await rightsOf('espalier_finder')).toEqual({});
    expect(await columnsOf('espalier_finder', 'select')).toEqual([
      ...['alerts.clinic_id', 'alerts.evaluated_at', 'alerts.id', 'alerts.received_at'],
      ...['check_ins.clinic_id', 'check_ins.evaluated_at', 'check_ins.id', 'check_ins.received_at'],
      'clinics.id',
      ...['notifications.clinic_id', 'notifications.due_at', 'notifications.id', 'notifications.kind'],
      ...['notifications.leased_until', 'notifications.state'],
    ]);
  });
});
