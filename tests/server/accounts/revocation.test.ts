import { hash } from '@node-rs/argon2';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeClinic, makePatient, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { signInPlainly } from './ways.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const races = 1000;
const atOnce = 20;

/** What may end a session while its requests are under way. */
const revocations = [
  (victim: TestBrowser) => victim.call('delete', '/api/session'),
  (_victim: TestBrowser, keeper: TestBrowser, id: string) => keeper.call('delete', `/api/sessions/${id}`),
  (_victim: TestBrowser, keeper: TestBrowser) => keeper.call('delete', '/api/sessions'),
];

/** What might bring one back: it touches the idle clock, writes a proof, or makes the store save its row again. */
const inFlight = [
  (victim: TestBrowser) => victim.call('post', '/api/session/activity'),
  (victim: TestBrowser) =>
    victim.call('post', '/api/session/proof', { way: 'password', password: testPassword }),
  (victim: TestBrowser) => victim.call('get', '/api/session'),
  (victim: TestBrowser) => victim.call('get', '/api/ways-in'),
];

/** A password whose check costs little: a thousand sign-ins are no test of argon2. */
const withCheapPassword = async (person: TestPerson): Promise<TestPerson> => {
  await database.asSuperuser.query('update credentials set password_hash = $1 where person_id = $2', [
    await hash(testPassword, { memoryCost: 8, timeCost: 1, parallelism: 1 }),
    person.personId,
  ]);
  return person;
};

const stored = async (sessionId: string) => {
  const { rows } = await database.asSuperuser.query<{ revoked: Date | null; active: Date; proven: Date }>(
    `select revoked_at as revoked, last_activity_at as active, proven_at as proven
     from signed_in_sessions where id = $1`,
    [sessionId],
  );
  return rows[0]!;
};

const newestSessionOf = async ({ personId }: TestPerson): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    'select id from signed_in_sessions where person_id = $1 order by started_at desc limit 1',
    [personId],
  );
  return rows[0]!.id;
};

/** One race; afterwards the browser asks again, and nothing of the session has moved. */
const race = async (person: TestPerson, keeper: TestBrowser, round: number): Promise<string[]> => {
  const victim = await signInPlainly(web, person);
  const sessionId = await newestSessionOf(person);
  const { cookie, me } = victim;
  const revoke = revocations[round % revocations.length]!;
  const requests = inFlight.map((send) => () => send(victim));
  // The revocation starts first, between, or last, so that it meets requests at every stage.
  requests.splice(round % (requests.length + 1), 0, () => revoke(victim, keeper, sessionId));
  const answers = await Promise.all(requests.map((send) => send()));
  const faults = answers
    .filter(({ status }) => ![200, 204, 401].includes(status))
    .map(({ status, text }) => `round ${round}: ${status} ${text}`);

  const atRevocation = await stored(sessionId);
  if (atRevocation.revoked === null) faults.push(`round ${round}: not revoked`);
  // The cookie as it was, whatever the answers made of it.
  Object.assign(victim, { cookie, me });
  for (const send of [inFlight[0]!, inFlight[2]!]) {
    const { status, text } = await send(victim);
    const isNobody = status === 401 || (status === 200 && text === '{"me":null}');
    if (!isNobody) faults.push(`round ${round}: answered ${status} ${text} after the revocation`);
  }
  expect(await stored(sessionId)).toEqual(atRevocation);
  return faults;
};

it(`revives no session in ${races} races of its end against requests under way`, async () => {
  const lanes = await Promise.all(
    Array.from({ length: atOnce }, async () => {
      const person = await withCheapPassword(await makePatient(database, clinicId));
      return { person, keeper: await signInPlainly(web, person) };
    }),
  );
  const faults = await Promise.all(
    lanes.map(async ({ person, keeper }, lane) => {
      const found: string[] = [];
      for (let i = 0; i < races / atOnce; i += 1)
        found.push(...(await race(person, keeper, lane + i * atOnce)));
      return found;
    }),
  );
  expect(faults.flat()).toEqual([]);
  const { rows } = await database.asSuperuser.query<{ ended: string; alive: string }>(
    `select count(*) filter (where revoked_at is not null) as ended,
       count(*) filter (where revoked_at is null) as alive from signed_in_sessions`,
  );
  expect(rows[0]).toEqual({ ended: String(races), alive: String(atOnce) });
}, 300_000);
