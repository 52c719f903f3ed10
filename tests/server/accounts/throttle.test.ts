import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeClinic, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const makeTherapist = (): Promise<TestPerson> => makePerson(database, clinicId, ['therapist']);
const tryToSignIn = (email: string, password = 'not the password') =>
  web.anonymous().call('post', '/api/session', { email, password });
const passSeconds = (seconds: number) => {
  now = new Date(now.getTime() + seconds * 1000);
};

/** Fails to sign in until this many tries were admitted, and gives the wait in seconds before each of them. */
const waitsBefore = async (email: string, admitted: number): Promise<number[]> => {
  const waits: number[] = [];
  for (let i = 0; i < admitted; i += 1) {
    let wait = 0;
    let answer = await tryToSignIn(email);
    if (answer.status === 429) {
      wait = Number(answer.headers.get('retry-after'));
      expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:too-many-attempts', retryAfter: wait });
      passSeconds(wait - 1);
      expect((await tryToSignIn(email)).status).toBe(429);
      passSeconds(1);
      answer = await tryToSignIn(email);
    }
    expect(answer.status).toBe(401);
    waits.push(wait);
  }
  return waits;
};

// Safety numbers: 5 free failures, then 30 s doubling to 1 h (D).
const expectedWaits = [0, 0, 0, 0, 0, 30, 60, 120, 240, 480, 960, 1920, 3600, 3600];

describe('after failures', () => {
  it('waits 30 s after the fifth and twice as long after each further one, up to an hour', async () => {
    const { email } = await makeTherapist();
    expect(await waitsBefore(email, expectedWaits.length)).toEqual(expectedWaits);
  });

  it('waits alike for an account that does not exist', async () => {
    expect(await waitsBefore('nobody@people.example', 8)).toEqual(expectedWaits.slice(0, 8));
  });

  it('does not admit the right password either while it waits, and does once the wait is over', async () => {
    const { email } = await makeTherapist();
    await waitsBefore(email, 5);
    expect((await tryToSignIn(email, testPassword)).status).toBe(429);
    passSeconds(30);
    expect((await tryToSignIn(email, testPassword)).status).toBe(201);
  });

  it('counts one e-mail in any case and leaves the others alone', async () => {
    const { email } = await makeTherapist();
    await waitsBefore(email, 5);
    expect((await tryToSignIn(` ${email.toUpperCase()}`)).status).toBe(429);
    const other = await makeTherapist();
    expect((await tryToSignIn(other.email, testPassword)).status).toBe(201);
  });
});

it('forgets the failures after a success', async () => {
  const { email } = await makeTherapist();
  await waitsBefore(email, 4);
  expect((await tryToSignIn(email, testPassword)).status).toBe(201);
  expect(await waitsBefore(email, 6)).toEqual([0, 0, 0, 0, 0, 30]);
});

it('forgets the failures after a day without one', async () => {
  const { email } = await makeTherapist();
  await waitsBefore(email, 5);
  passSeconds(24 * 3600 + 1);
  expect(await waitsBefore(email, 6)).toEqual([0, 0, 0, 0, 0, 30]);
});

it('admits of a hundred tries at once no more than the free ones', async () => {
  const { email } = await makeTherapist();
  const answers = await Promise.all(Array.from({ length: 100 }, () => tryToSignIn(email)));
  const count = (status: number) => answers.filter((answer) => answer.status === status).length;
  expect({ admitted: count(401), refused: count(429) }).toEqual({ admitted: 5, refused: 95 });
});
