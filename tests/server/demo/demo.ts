import pg from 'pg';
import type { PersonActor } from '#server/db/actor.ts';
import { withTx, type Tx } from '#server/db/with-tx.ts';
import { runDemoAct, type DemoAct } from '#server/demo/acts.ts';
import { demoClinicId } from '#server/demo/clinic.ts';
import { loadPersonActor } from '#server/features/accounts/queries.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';

export type DemoDatabase = TestDatabase & {
  act: (act: DemoAct, now: Date) => Promise<void>;
  /** As an owner whom row security does not hold. */
  actAsSuperuser: (act: DemoAct, now: Date) => Promise<void>;
};

/** A database of one's own in which the demo's acts run as its owner, as the start does it. */
export const demoDatabase = async (): Promise<DemoDatabase> => {
  const database = await cloneDatabase();
  const owner = new pg.Pool({ connectionString: database.urls.owner, max: 1, options: '-c timezone=UTC' });
  return {
    ...database,
    act: (act, now) => runDemoAct(owner, act, now, testSecrets),
    actAsSuperuser: (act, now) => runDemoAct(database.asSuperuser, act, now, testSecrets),
    drop: async () => {
      await owner.end();
      await database.drop();
    },
  };
};

/** Does something as a person of the demo, through the product's own pool and row security. */
export const asPerson = <T>(
  { pools }: TestDatabase,
  personId: string,
  run: (tx: Tx, actor: PersonActor) => Promise<T>,
): Promise<T> => {
  const person = { kind: 'person', clinicId: demoClinicId, personId } as const;
  return withTx(pools.app, person, async (tx) => {
    const actor = await loadPersonActor(tx, person);
    if (!actor) throw new Error('No such person in the demo.');
    return run(tx, actor);
  });
};

/** Every row of a clinic as text, table by table, in an order of its own. */
export const rowsOf = async (
  { asSuperuser }: TestDatabase,
  clinicId: string,
  leaveOut: readonly string[] = [],
): Promise<Record<string, string[]>> => {
  const { rows: tables } = await asSuperuser.query<{ name: string }>(
    `select table_name as name from information_schema.columns
     where table_schema = 'public' and column_name = 'clinic_id' order by table_name`,
  );
  const found: Record<string, string[]> = {};
  for (const { name } of tables) {
    const { rows } = await asSuperuser.query<{ row: string }>(
      `select (to_jsonb(t) - $2::text[])::text as row from ${name} t where clinic_id = $1 order by 1`,
      [clinicId, leaveOut],
    );
    found[name] = rows.map(({ row }) => row);
  }
  const { rows } = await asSuperuser.query<{ row: string }>(
    'select to_jsonb(c)::text as row from clinics c where id = $1',
    [clinicId],
  );
  return { ...found, clinics: rows.map(({ row }) => row) };
};
