import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  testPassword,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

const minute = 60_000;
const hour = 60 * minute;
const day = 24 * hour;

let database: TestDatabase;
let web: TestWeb;
let therapist: TestPerson;
let patient: TestPatient;
let now = new Date();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database, { clock: () => now });
  const clinicId = await makeClinic(database);
  therapist = await makePerson(database, clinicId, ['therapist']);
  patient = await makePatient(database, clinicId, { lead: therapist });
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(() => {
  now = new Date();
});

const pass = (ms: number) => {
  now = new Date(now.getTime() + ms);
};
const isIn = async (browser: TestBrowser): Promise<boolean> => {
  const own = browser.me?.patient ? '/api/today' : '/api/worker';
  const { status } = await browser.call('get', own);
  expect([200, 401]).toContain(status);
  const { me } = (await browser.call('get', '/api/session')).body as { me: Me | null };
  expect(me !== null).toBe(status === 200);
  return status === 200;
};
const act = async (browser: TestBrowser) => browser.call('post', '/api/session/activity');
const signInStaying = async (person: TestPerson) => {
  const browser = web.anonymous();
  const answer = await browser.call('post', '/api/session', {
    email: person.email,
    password: testPassword,
    staySignedIn: true,
  });
  browser.me = (answer.body as { me: Me }).me;
  return { browser, cookie: answer.headers.getSetCookie()[0] ?? '' };
};

describe.each([
  { who: 'clinic staff', person: () => therapist, idle: 15 * minute, most: 12 * hour },
  { who: 'a patient', person: () => patient, idle: 30 * minute, most: 24 * hour },
])('the session of $who', ({ person, idle, most }) => {
  it('ends when nothing was done for its idle time, and polling is nothing', async () => {
    const browser = await web.signIn(person());
    pass(idle - 1000);
    expect(await isIn(browser)).toBe(true);
    pass(1000);
    expect(await isIn(browser)).toBe(false);
    expect((await act(browser)).status).toBe(401);
  });

  it('is carried on by what the person does, and says until when', async () => {
    const browser = await web.signIn(person());
    for (let i = 0; i < 3; i += 1) {
      pass(idle - 1000);
      const times = (await act(browser)).body as { idleEndsAt: string };
      expect(times.idleEndsAt).toBe(new Date(now.getTime() + idle).toISOString());
    }
    expect(await isIn(browser)).toBe(true);
  });

  it('ends at its longest life however much is done', async () => {
    const browser = await web.signIn(person());
    const endsAt = now.getTime() + most;
    expect(browser.me?.session.endsAt).toBe(new Date(endsAt).toISOString());
    while (now.getTime() + idle - 1000 < endsAt) {
      pass(idle - 1000);
      expect((await act(browser)).status).toBe(200);
    }
    now = new Date(endsAt - 1);
    expect(await isIn(browser)).toBe(true);
    now = new Date(endsAt);
    expect(await isIn(browser)).toBe(false);
  });
});

describe('staying signed in', () => {
  it('lasts 30 days for a patient without any activity, and so does the cookie', async () => {
    const signedInAt = now.getTime();
    const { browser, cookie } = await signInStaying(patient);
    const expires = Date.parse(/Expires=([^;]+)/.exec(cookie)?.[1] ?? '');
    expect(Math.abs(expires - (signedInAt + 30 * day))).toBeLessThan(2000);
    pass(30 * day - 1000);
    expect(await isIn(browser)).toBe(true);
    pass(1000);
    expect(await isIn(browser)).toBe(false);
  });

  it('is not for clinic staff: 15 minutes idle, and a cookie that ends with the browser', async () => {
    const { browser, cookie } = await signInStaying(therapist);
    expect(cookie).not.toMatch(/Expires|Max-Age/i);
    pass(15 * minute);
    expect(await isIn(browser)).toBe(false);
  });

  it('is not what a patient gets who did not ask for it', async () => {
    const browser = web.anonymous();
    const answer = await browser.call('post', '/api/session', {
      email: patient.email,
      password: testPassword,
    });
    expect(answer.headers.getSetCookie()[0]).not.toMatch(/Expires|Max-Age/i);
  });
});

describe('an ended session', () => {
  it('never answers again, even when the store brings its row back', async () => {
    const browser = await web.signIn(therapist);
    const { rows } = await database.asSuperuser.query('select * from browser_sessions');
    expect((await browser.call('delete', '/api/session')).status).toBe(204);
    const { cookie } = browser;
    await database.asSuperuser.query('delete from browser_sessions');
    for (const { sid, sess, expire } of rows as { sid: string; sess: unknown; expire: Date }[]) {
      await database.asSuperuser.query('insert into browser_sessions values ($1, $2, $3)', [
        sid,
        JSON.stringify(sess),
        expire,
      ]);
    }
    browser.cookie = cookie;
    expect(await isIn(browser)).toBe(false);
  });

  it('closes its socket within two seconds of signing out, and no other', async () => {
    const [leaving, staying] = [await web.signIn(therapist), await web.signIn(therapist)];
    const { socket, ended } = await leaving.socket();
    const other = await staying.socket();
    const startedAt = performance.now();
    await leaving.call('delete', '/api/session');
    await ended;
    expect(performance.now() - startedAt).toBeLessThan(2000);
    await expect.poll(() => socket.connected).toBe(false);
    expect(other.socket.connected).toBe(true);
    await expect(leaving.socket()).rejects.toThrow('not-signed-in');
  });

  it('is one at once whose person is no longer active', async () => {
    const person = await makePerson(database, therapist.clinicId, ['therapist']);
    const browser = await web.signIn(person);
    await database.asSuperuser.query('update people set active = false where id = $1', [person.personId]);
    expect(await isIn(browser)).toBe(false);
    await expect(browser.socket()).rejects.toThrow('not-signed-in');
  });
});

describe('signing in', () => {
  it('makes a new session id, so that one planted before is worth nothing', async () => {
    const planted = await web.signIn(therapist);
    const browser = web.anonymous();
    browser.cookie = planted.cookie;
    await browser.call('post', '/api/session', { email: patient.email, password: testPassword });
    expect(browser.cookie).not.toBe(planted.cookie);
    expect(await isIn(planted)).toBe(false);
  });

  it('ends the session that the browser held before, with its sockets', async () => {
    const browser = await web.signIn(therapist);
    const { ended } = await browser.socket();
    await browser.call('post', '/api/session', { email: patient.email, password: testPassword });
    await ended;
    const { rows } = await database.asSuperuser.query(
      'select 1 from signed_in_sessions where person_id = $1 and revoked_at is null and started_at = $2',
      [therapist.personId, now],
    );
    expect(rows).toEqual([]);
  });

  it('leaves sessions on other devices alone', async () => {
    const [first, second] = [await web.signIn(patient), await web.signIn(patient)];
    expect([await isIn(first), await isIn(second)]).toEqual([true, true]);
  });
});
