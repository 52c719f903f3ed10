import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { fencedTables } from '../whole-clinic.ts';
import { gateTables } from './gate-tables.ts';

/** Those of them that know which clinic somebody belongs to. */
const gateTablesOfClinics = [
  'authenticators',
  'credentials',
  'one_time_tokens',
  'passkeys',
  'pending_sign_ins',
  'recovery_codes',
  'signed_in_sessions',
];
const clinicTables = [...fencedTables, 'clinics'].sort();

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(() => database.drop());

const read = async <T extends Record<string, unknown>>(text: string, values: unknown[] = []): Promise<T[]> =>
  (await database.asSuperuser.query<T>(text, values)).rows;

const one = async <T>(text: string): Promise<T[]> =>
  (await read<{ value: T }>(text)).map(({ value }) => value);

const fence = `(clinic_id = ( SELECT (NULLIF(current_setting('app.clinic_id'::text, true), ''::text))::uuid AS "nullif"))`;

describe('row security', () => {
  it('knows every table of the schema as inside the fence or as one of the gate', async () => {
    const tables = await one<string>(
      `select tablename::text as value from pg_tables where schemaname = 'public'`,
    );
    expect(tables.sort()).toEqual([...clinicTables, ...gateTables].sort());
  });

  it('leaves no table with a clinic outside the fence but those of the gate', async () => {
    const withClinic = await one<string>(
      `select table_name::text as value from information_schema.columns
       where table_schema = 'public' and column_name = 'clinic_id'`,
    );
    const outside = withClinic.filter((table) => !clinicTables.includes(table));
    expect(outside.sort()).toEqual(gateTablesOfClinics);
  });

  it.each(clinicTables)('is on and forced for %s, with the fence for reading and writing', async (table) => {
    const [state] = await read(
      `select relrowsecurity as enabled, relforcerowsecurity as forced from pg_class
       where oid = ('public.' || $1)::regclass`,
      [table],
    );
    expect(state).toEqual({ enabled: true, forced: true });
    const policies = await read<{ name: string }>(
      `select policyname::text as name, permissive, roles::text[] as roles, cmd, qual, with_check
       from pg_policies where schemaname = 'public' and tablename = $1 order by policyname`,
      [table],
    );
    expect(policies[0]).toEqual({
      name: 'clinic_fence',
      permissive: 'PERMISSIVE',
      roles: ['public'],
      cmd: 'ALL',
      qual: table === 'clinics' ? fence.replace('clinic_id', 'id') : fence,
      // Without a check of its own a policy checks what is written by what may be read.
      with_check: null,
    });
    const reachedByFinder = ['clinics', 'check_ins', 'alerts', 'notifications'].includes(table);
    expect(policies.slice(1)).toEqual(
      reachedByFinder
        ? [expect.objectContaining({ name: 'finder_reads_ids', roles: ['espalier_finder'], cmd: 'SELECT' })]
        : [],
    );
  });
});

describe('roles', () => {
  it('cannot pass row security, own nothing and may make nothing', async () => {
    const roles = await read(
      `select rolname::text as role, rolcanlogin as login, rolsuper as super, rolbypassrls as bypass,
         rolcreaterole as makes_roles, rolcreatedb as makes_databases, rolreplication as replicates
       from pg_roles where rolname in ('espalier_app', 'espalier_gate', 'espalier_finder') order by 1`,
    );
    const powerless = {
      super: false,
      bypass: false,
      makes_roles: false,
      makes_databases: false,
      replicates: false,
    };
    expect(roles).toEqual([
      { role: 'espalier_app', login: true, ...powerless },
      { role: 'espalier_finder', login: false, ...powerless },
      { role: 'espalier_gate', login: true, ...powerless },
    ]);
    const owned = await read(
      `select relname from pg_class where relowner in ('espalier_app'::regrole, 'espalier_gate'::regrole, 'espalier_finder'::regrole)
       union all select nspname from pg_namespace where nspowner in ('espalier_app'::regrole, 'espalier_gate'::regrole, 'espalier_finder'::regrole)
       union all select proname from pg_proc where proowner in ('espalier_app'::regrole, 'espalier_gate'::regrole)`,
    );
    expect(owned).toEqual([]);
    const mayMake = await one<boolean>(
      `select has_schema_privilege(role, schema, 'create') as value
       from unnest(array['espalier_app', 'espalier_gate', 'espalier_finder']) role,
         unnest(array['public', 'jobs']) schema`,
    );
    expect(mayMake).toEqual([false, false, false, false, false, false]);
  });

  it('inherit nothing from another role', async () => {
    const memberships = await one<string>(
      `select roleid::regrole::text as value from pg_auth_members
       where member in ('espalier_app'::regrole, 'espalier_gate'::regrole, 'espalier_finder'::regrole)`,
    );
    expect(memberships).toEqual([]);
  });
});

describe('keys and functions', () => {
  it('make every reference between tables of a clinic composite, beginning with the clinic', async () => {
    const keys = await read<{ name: string; own: string[]; target: string; theirs: string[] }>(
      `select conname::text as name, confrelid::regclass::text as target,
         (select array_agg(a.attname::text order by k.i) from unnest(conkey) with ordinality k(n, i)
           join pg_attribute a on a.attrelid = conrelid and a.attnum = k.n) as own,
         (select array_agg(a.attname::text order by k.i) from unnest(confkey) with ordinality k(n, i)
           join pg_attribute a on a.attrelid = confrelid and a.attnum = k.n) as theirs
       from pg_constraint where contype = 'f' and connamespace = 'public'::regnamespace`,
    );
    expect(keys.length).toBeGreaterThan(fencedTables.length);
    for (const { name, own, target, theirs } of keys) {
      if (target === 'clinics') expect({ own, theirs }, name).toEqual({ own: ['clinic_id'], theirs: ['id'] });
      else {
        expect(own.length, name).toBeGreaterThan(1);
        expect([own[0], theirs[0]], name).toEqual(['clinic_id', 'clinic_id']);
      }
    }
  });

  it('bind every table of a clinic to a clinic that exists, by itself or through what it belongs to', async () => {
    const unbound = await one<string>(
      `select table_name::text as value from information_schema.columns c
       where table_schema = 'public' and column_name = 'clinic_id'
         and not exists (select from pg_constraint k where k.contype = 'f' and k.conrelid = ('public.' || c.table_name)::regclass)`,
    );
    expect(unbound.sort()).toEqual(gateTablesOfClinics);
  });

  it('let the functions that look across clinics return ids only, to the application only', async () => {
    const functions = await read(
      `select p.proname::text as name, p.proowner::regrole::text as owner, p.prosecdef as definer,
         pg_get_function_result(p.oid) as result, p.proconfig as settings,
         has_function_privilege('espalier_app', p.oid, 'execute') as app,
         has_function_privilege('espalier_gate', p.oid, 'execute') as gate,
         exists (select from aclexplode(p.proacl) a where a.grantee = 0) as everybody
       from pg_proc p where p.pronamespace = 'public'::regnamespace order by 1`,
    );
    const shape = {
      owner: 'espalier_finder',
      definer: true,
      settings: ['search_path=pg_catalog, public'],
      app: true,
      gate: false,
      everybody: false,
    };
    expect(functions).toEqual([
      { name: 'all_clinic_ids', result: 'TABLE(clinic_id uuid)', ...shape },
      { name: 'due_notifications', result: 'TABLE(clinic_id uuid, id uuid)', ...shape },
      { name: 'only_clinic_id', result: 'uuid', ...shape },
      { name: 'unevaluated_before', result: 'TABLE(clinic_id uuid, kind text, id uuid)', ...shape },
    ]);
  });
});
