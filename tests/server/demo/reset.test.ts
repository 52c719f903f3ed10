import { execFile } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { getTableName } from 'drizzle-orm';
import { testSecrets } from '#tests/support/secrets.ts';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { demoAccounts, demoAuthenticatorSecrets } from '#server/demo/accounts.ts';
import { demoClinicId } from '#server/demo/clinic.ts';
import { personIdOf } from '#server/demo/patients.ts';
import { staffId } from '#server/demo/staff.ts';
import { clinicTables } from '#server/demo/tables.ts';
import { startThread } from '#server/features/threads/starting.ts';
import { claim } from '#server/features/triage/work.ts';
import { startSession } from '#server/http/sessions.ts';
import { plantWaysIn, plantWholeClinic, type WholeClinic } from '../whole-clinic.ts';
import { asPerson, demoDatabase, rowsOf, type DemoDatabase } from './demo.ts';

/** A Tuesday, 10:50 in the clinic. */
const now = new Date('2026-12-01T15:50:00Z');
const withoutSalts = ['password_hash', 'sealed_secret'];
let demo: DemoDatabase;
let other: WholeClinic;
let fresh: Record<string, string[]>;
let untouched: Record<string, string[]>;

/** Signs somebody in as the web does: a session row and a browser that holds it. */
const signIn = async (clinicId: string, personId: string): Promise<void> => {
  const session = await startSession(
    demo.pools.gate,
    { clinicId, personId, isStaff: true, staySignedIn: false, secondFactor: null, userAgent: null },
    now,
  );
  await demo.asSuperuser.query('insert into browser_sessions (sid, sess, expire) values ($1, $2, $3)', [
    randomUUID(),
    JSON.stringify({ cookie: {}, passport: { user: session.sessionId } }),
    now,
  ]);
};

const runProgram = async (act: string): Promise<string> => {
  const program = ['node_modules/tsx/dist/cli.mjs', 'server/demo/index.ts', act];
  const { stdout } = await promisify(execFile)(process.execPath, program, {
    cwd: fileURLToPath(new URL('../../..', import.meta.url)),
    env: {
      PATH: process.env.PATH,
      OWNER_DATABASE_URL: demo.urls.owner,
      TOKEN_SECRET: testSecrets.tokenSecret,
      SEAL_SECRET: testSecrets.sealSecret,
    },
  });
  return stdout;
};

/** What people leave behind who have tried the demo out. */
const useDemo = async (): Promise<void> => {
  await asPerson(demo, personIdOf('Ines Valcourt'), (tx, actor) =>
    startThread(
      tx,
      actor,
      { id: randomUUID(), subject: 'Hello', message: { id: randomUUID(), text: 'Hello' } },
      now,
    ),
  );
  const { rows } = await demo.asSuperuser.query<{ id: string }>(
    `select id from flags where state = 'open' and clinic_id = $1 limit 1`,
    [demoClinicId],
  );
  await asPerson(demo, staffId('noor'), (tx, actor) => claim(tx, actor, rows[0]!.id, now));
  await signIn(demoClinicId, staffId('noor'));
};

const browsers = async (): Promise<number> =>
  (await demo.asSuperuser.query('select sid from browser_sessions')).rows.length;

beforeAll(async () => {
  demo = await demoDatabase();
  other = await plantWholeClinic(demo);
  await signIn(other.clinicId, other.therapist.personId);
  await plantWaysIn(demo, other.therapist);
  untouched = await rowsOf(demo, other.clinicId);
  await demo.act('fill', now);
  fresh = await rowsOf(demo, demoClinicId, withoutSalts);
  await useDemo();
  expect(await rowsOf(demo, demoClinicId, withoutSalts)).not.toEqual(fresh);
  expect(await browsers()).toBe(2);
  await demo.act('reset', now);
});

afterAll(() => demo.drop());

test('a reset leaves what a first fill leaves, and nothing that users had added', async () => {
  expect(await rowsOf(demo, demoClinicId, withoutSalts)).toEqual(fresh);
});

test('a reset ends the sessions of the demo’s people and nobody else’s', async () => {
  expect(await browsers()).toBe(1);
  const { rows } = await demo.asSuperuser.query('select clinic_id from signed_in_sessions');
  expect(rows).toEqual([{ clinic_id: other.clinicId }]);
});

test('a reset leaves another clinic as it was, byte for byte', async () => {
  for (const rows of Object.values(untouched)) expect(rows.length).toBeGreaterThan(0);
  expect(await rowsOf(demo, other.clinicId)).toEqual(untouched);
});

test('so it does where the owner could pass row security', async () => {
  await demo.actAsSuperuser('reset', now);
  expect(await rowsOf(demo, other.clinicId)).toEqual(untouched);
  expect(await rowsOf(demo, demoClinicId, withoutSalts)).toEqual(fresh);
}, 60_000);

test('a clinic with the demo’s id that is not marked as a demo is refused, and stays', async () => {
  await demo.asSuperuser.query('update clinics set is_demo = false where id = $1', [demoClinicId]);
  const before = await rowsOf(demo, demoClinicId);
  for (const act of ['fill', 're-anchor', 'reset'] as const) {
    await expect(demo.act(act, new Date('2026-12-05T15:50:00Z'))).rejects.toThrow('is not a demo');
  }
  expect(await rowsOf(demo, demoClinicId)).toEqual(before);
  await demo.asSuperuser.query('update clinics set is_demo = true where id = $1', [demoClinicId]);
});

test('the demo knows every table behind the fence', async () => {
  const { rows } = await demo.asSuperuser.query<{ name: string }>(
    `select relname as name from pg_class where relrowsecurity and relname <> 'clinics' order by 1`,
  );
  expect(clinicTables.map((table) => getTableName(table)).sort()).toEqual(rows.map(({ name }) => name));
});

test('the program does what its argument says and ends with the accounts on a line of their own', async () => {
  const stdout = await runProgram('fill');
  expect(JSON.parse(stdout.trimEnd().split('\n').at(-1)!)).toEqual({
    accounts: demoAccounts,
    authenticators: demoAuthenticatorSecrets,
  });
}, 60_000);

test('the program refuses an act that it does not know', async () => {
  await expect(runProgram('refill')).rejects.toThrow('Say what to do: fill, re-anchor, remove or reset.');
}, 60_000);

test('a removal takes the demo’s people and ways in away, and nothing of another clinic', async () => {
  await demo.act('remove', now);
  for (const [table, rows] of Object.entries(await rowsOf(demo, demoClinicId))) {
    expect(rows, table).toEqual([]);
  }
  expect(await rowsOf(demo, other.clinicId)).toEqual(untouched);
  await demo.act('remove', now);
}, 60_000);
