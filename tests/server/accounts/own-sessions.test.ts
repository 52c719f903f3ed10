import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { listSessions } from '#shared/accounts/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import { makeClinic, makePatient, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { auditOf } from './ways.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let now = new Date('2026-11-12T10:00:00Z');

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const passMinutes = (minutes: number) => {
  now = new Date(now.getTime() + minutes * 60_000);
};

const windowsChrome =
  'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/140.0.0.0 Safari/537.36';

const signInOn = async ({ email }: TestPerson, userAgent = windowsChrome, browser = web.anonymous()) => {
  browser.me = null;
  const body = { email, password: testPassword, staySignedIn: true };
  const answer = await browser.call('post', '/api/session', body, { 'user-agent': userAgent });
  browser.me = (answer.body as { me: TestBrowser['me'] }).me;
  return browser;
};

const sessionsOf = async (browser: TestBrowser) =>
  ((await browser.call('get', '/api/sessions')).body as OutputOf<typeof listSessions>).sessions;
const currentOf = async (browser: TestBrowser) =>
  (await sessionsOf(browser)).find(({ current }) => current)!.id;
const isIn = async (browser: TestBrowser) => (await browser.call('get', '/api/sessions')).status === 200;

/** The browser lets itself be woken, for the session that it holds now. */
const subscribe = async ({ clinicId: clinic, personId }: TestPerson, browser: TestBrowser) => {
  await database.asSuperuser.query(
    `insert into push_subscriptions
       (clinic_id, person_id, session_id, endpoint, p256dh, auth, device_name, created_at)
     values ($1, $2, $3, $4, 'key', 'secret', 'Chrome on Windows', $5)`,
    [clinic, personId, await currentOf(browser), `https://push.example/${randomUUID()}`, now],
  );
};
const pushSessionsOf = async ({ personId }: TestPerson) => {
  const { rows } = await database.asSuperuser.query<{ session: string }>(
    'select session_id as session from push_subscriptions where person_id = $1',
    [personId],
  );
  return rows.map(({ session }) => session);
};

describe('the list of one’s own devices', () => {
  it('names each, says which asks, and leaves out what has ended', async () => {
    const patient = await makePatient(database, clinicId);
    const desk = await signInOn(patient);
    passMinutes(10);
    const phone = await signInOn(
      patient,
      'Mozilla/5.0 (iPhone; CPU iPhone OS 18_5 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Mobile/15E148 Safari/604.1',
    );
    const gone = await signInOn(patient);
    await gone.call('delete', '/api/session');
    await signInOn(await makePatient(database, clinicId));
    await subscribe(patient, desk);
    expect(await sessionsOf(phone)).toMatchObject([
      { device: 'Safari on iPhone', current: true, staysSignedIn: true, push: false },
      { device: 'Chrome on Windows', current: false, push: true },
    ]);
  });
});

describe('signing another device out', () => {
  it('ends its session, its sockets and its push, and nothing else', async () => {
    const patient = await makePatient(database, clinicId);
    const [here, there] = [await signInOn(patient), await signInOn(patient)];
    await subscribe(patient, there);
    await subscribe(patient, here);
    const { ended } = await there.socket();
    const id = await currentOf(there);
    expect((await here.call('delete', `/api/sessions/${id}`)).status).toBe(204);
    await ended;
    expect([await isIn(here), await isIn(there)]).toEqual([true, false]);
    expect(await pushSessionsOf(patient)).toEqual([await currentOf(here)]);
    expect((await here.call('delete', `/api/sessions/${id}`)).status).toBe(404);
    expect(await auditOf(database, patient)).toContain('session.ended-elsewhere');
  });

  it('is not for the session of somebody else, which looks like none and goes on', async () => {
    const [mine, theirs] = [
      await signInOn(await makePatient(database, clinicId)),
      await signInOn(await makePatient(database, clinicId)),
    ];
    const foreign = await mine.call('delete', `/api/sessions/${await currentOf(theirs)}`);
    const missing = await mine.call('delete', `/api/sessions/${randomUUID()}`);
    expect([foreign.status, foreign.text]).toEqual([404, missing.text]);
    expect(await isIn(theirs)).toBe(true);
  });

  it('does so for all others at once, and says how many there were', async () => {
    const patient = await makePatient(database, clinicId);
    const here = await signInOn(patient);
    const others = [await signInOn(patient), await signInOn(patient), await signInOn(patient)];
    await subscribe(patient, others[0]!);
    const sockets = await Promise.all(others.map((other) => other.socket()));
    expect((await here.call('delete', '/api/sessions')).body).toEqual({ ended: 3 });
    await Promise.all(sockets.map(({ ended }) => ended));
    expect(await Promise.all([here, ...others].map(isIn))).toEqual([true, false, false, false]);
    expect(await pushSessionsOf(patient)).toEqual([]);
  });
});

describe('push of a browser', () => {
  it('ends with a sign-out', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInOn(patient);
    await subscribe(patient, browser);
    await browser.call('delete', '/api/session');
    expect(await pushSessionsOf(patient)).toEqual([]);
  });

  it.each([
    ['is still alive', async () => undefined],
    [
      'has ended by itself',
      async ({ personId }: TestPerson) => {
        await database.asSuperuser.query('update signed_in_sessions set ends_at = $1 where person_id = $2', [
          now,
          personId,
        ]);
      },
    ],
  ])('is not left to the next user of a shared device, where the session before %s', async (_what, end) => {
    const before = await makePatient(database, clinicId);
    const elsewhere = await makePatient(database, await makeClinic(database));
    const browser = await signInOn(before);
    await subscribe(before, browser);
    await end(before);
    await signInOn(elsewhere, windowsChrome, browser);
    expect(await pushSessionsOf(before)).toEqual([]);
  });

  it('goes on when the same person signs in again there', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInOn(patient);
    await subscribe(patient, browser);
    await database.asSuperuser.query('update signed_in_sessions set ends_at = $1 where person_id = $2', [
      now,
      patient.personId,
    ]);
    await signInOn(patient, windowsChrome, browser);
    expect(await pushSessionsOf(patient)).toEqual([await currentOf(browser)]);
  });
});

it('keeps when somebody first signed in, and does not move it', async () => {
  const patient = await makePatient(database, clinicId);
  const firstSignIn = async () => {
    const { rows } = await database.asSuperuser.query<{ at: Date | null }>(
      'select first_signed_in_at as at from people where id = $1',
      [patient.personId],
    );
    return rows[0]?.at?.toISOString() ?? null;
  };
  expect(await firstSignIn()).toBeNull();
  const first = now.toISOString();
  await signInOn(patient);
  passMinutes(1);
  await signInOn(patient);
  expect(await firstSignIn()).toBe(first);
});
