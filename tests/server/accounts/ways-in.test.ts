import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import {
  addPasskeyOn,
  auditOf,
  codeAt,
  enterWith,
  mailsTo,
  pendingOf,
  signInPlainly,
  tryPassword,
} from './ways.ts';

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

const passSeconds = (seconds: number) => {
  now = new Date(now.getTime() + seconds * 1000);
};

const makeTherapist = () => makePerson(database, clinicId, ['therapist']);
const waysOf = async (browser: TestBrowser) => (await browser.call('get', '/api/ways-in')).body as WaysIn;

/** Starts and confirms an app as its owner does; gives its secret and the recovery codes. */
const setUpApp = async (browser: TestBrowser) => {
  const started = await browser.call('post', '/api/authenticator');
  const { secret, uri, picture } = started.body as { secret: string; uri: string; picture: string };
  const confirmed = await browser.call('post', '/api/authenticator/confirmation', {
    code: codeAt(secret, now),
  });
  expect(confirmed.status, confirmed.text).toBe(200);
  const { recoveryCodes } = confirmed.body as { recoveryCodes: string[] };
  return { secret, uri, picture, recoveryCodes };
};

const give = (pendingId: string, way: string, code: string) =>
  web.anonymous().call('post', '/api/session/second-factor', { pendingId, answer: { way, code } });

describe('an authenticator app', () => {
  it('is set up by a picture or by typing, keeps its secret sealed, and tells its owner by mail', async () => {
    const therapist = await makeTherapist();
    const browser = await signInPlainly(web, therapist);
    const { secret, uri, picture, recoveryCodes } = await setUpApp(browser);
    expect(new URL(uri).searchParams.get('secret')).toBe(secret);
    expect(picture).toMatch(/^data:image\/svg\+xml;base64,/);
    expect(new Set(recoveryCodes).size).toBe(10);
    expect(await waysOf(browser)).toMatchObject({ authenticator: true, recoveryCodesLeft: 10 });
    const { rows } = await database.asSuperuser.query<{ text: string }>(
      `select (select jsonb_agg(a)::text from authenticators a) || (select jsonb_agg(r)::text from recovery_codes r) as text`,
    );
    for (const plain of [secret, ...recoveryCodes]) expect(rows[0]?.text).not.toContain(plain);
    expect(await auditOf(database, therapist)).toEqual([
      'authenticator.confirmed',
      'authenticator.started',
      'session.started',
    ]);
    expect(await mailsTo(database, therapist)).toMatchObject([
      { kind: 'sign-in-changed', path: '/clinic/account/sign-in' },
    ]);
  });

  it('is none before its first code was right', async () => {
    const therapist = await makeTherapist();
    const browser = await signInPlainly(web, therapist);
    await browser.call('post', '/api/authenticator');
    const wrong = await browser.call('post', '/api/authenticator/confirmation', { code: '000000' });
    expect(wrong.status).toBe(401);
    expect(await waysOf(browser)).toMatchObject({ authenticator: false, recoveryCodesLeft: 0 });
    expect((await tryPassword(web.anonymous(), therapist)).body).toMatchObject({ next: 'none' });
  });

  it('goes on until the one that takes its place is confirmed', async () => {
    const therapist = await makeTherapist();
    const browser = await signInPlainly(web, therapist);
    const { secret: old } = await setUpApp(browser);
    passSeconds(30);
    const { secret } = (await browser.call('post', '/api/authenticator')).body as { secret: string };
    expect((await give(await pendingOf(web, therapist), 'authenticator', codeAt(old, now))).status).toBe(201);
    passSeconds(30);
    const code = codeAt(secret, now);
    expect((await browser.call('post', '/api/authenticator/confirmation', { code })).status).toBe(200);
    passSeconds(30);
    expect((await give(await pendingOf(web, therapist), 'authenticator', codeAt(old, now))).status).toBe(401);
    expect((await give(await pendingOf(web, therapist), 'authenticator', codeAt(secret, now))).status).toBe(
      201,
    );
  });

  it('is confirmed once: of many first codes at once, one gets recovery codes', async () => {
    const browser = await signInPlainly(web, await makeTherapist());
    const { secret } = (await browser.call('post', '/api/authenticator')).body as { secret: string };
    const code = codeAt(secret, now);
    const answers = await Promise.all(
      Array.from({ length: 4 }, () => browser.call('post', '/api/authenticator/confirmation', { code })),
    );
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect((await waysOf(browser)).recoveryCodesLeft).toBe(10);
  });
});

describe('recovery codes', () => {
  it('let staff in once each, however they are typed', async () => {
    const therapist = await makeTherapist();
    const { recoveryCodes } = await setUpApp(await signInPlainly(web, therapist));
    const [first = '', second = ''] = recoveryCodes;
    expect((await tryPassword(web.anonymous(), therapist)).body).toMatchObject({
      ways: ['authenticator', 'recovery-code'],
    });
    const pendings = await Promise.all(Array.from({ length: 4 }, () => pendingOf(web, therapist)));
    const answers = await Promise.all(pendings.map((id) => give(id, 'recovery-code', first)));
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(1);
    const typed = second.replace('-', ' ').toLowerCase();
    expect((await give(await pendingOf(web, therapist), 'recovery-code', typed)).status).toBe(201);
    expect((await give(await pendingOf(web, therapist), 'recovery-code', typed)).status).toBe(401);
  });

  it('are replaced by a new set, and those of a colleague open nothing', async () => {
    const [therapist, colleague] = [await makeTherapist(), await makeTherapist()];
    const browser = await signInPlainly(web, therapist);
    const { recoveryCodes: old } = await setUpApp(browser);
    const { recoveryCodes: theirs } = await setUpApp(await signInPlainly(web, colleague));
    const renewed = await browser.call('post', '/api/recovery-codes');
    const { recoveryCodes } = renewed.body as { recoveryCodes: string[] };
    for (const code of [old[0]!, theirs[0]!]) {
      expect((await give(await pendingOf(web, therapist), 'recovery-code', code)).status).toBe(401);
    }
    expect((await give(await pendingOf(web, therapist), 'recovery-code', recoveryCodes[0]!)).status).toBe(
      201,
    );
    expect((await waysOf(browser)).recoveryCodesLeft).toBe(9);
  });

  it('are not made for whoever has nothing that they could stand in for', async () => {
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    expect((await browser.call('post', '/api/recovery-codes')).status).toBe(409);
  });
});

describe('the last way in', () => {
  const remove = (browser: TestBrowser, id: string) => browser.call('delete', `/api/passkeys/${id}`);
  const withPasskeys = async (person: TestPerson, count: number) => {
    const browser = await signInPlainly(web, person);
    for (let i = 0; i < count; i += 1) await addPasskeyOn(browser, softAuthenticator(web.url));
    return { browser, ids: (await waysOf(browser)).passkeys.map(({ id }) => id) };
  };
  const dropPassword = ({ personId }: TestPerson) =>
    database.asSuperuser.query('update credentials set password_hash = null where person_id = $1', [
      personId,
    ]);

  it('stays: a patient without a password keeps one passkey, also of two removed at once', async () => {
    const patient = await makePatient(database, clinicId);
    const { browser, ids } = await withPasskeys(patient, 2);
    await dropPassword(patient);
    const answers = await Promise.all(ids.map((id) => remove(browser, id)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(answers.find(({ status }) => status === 409)?.body).toMatchObject({
      detail: 'This is your only way in. Choose a password or add another passkey first.',
    });
    expect((await waysOf(browser)).passkeys).toHaveLength(1);
  });

  it('may be the password: then the last passkey of a patient goes', async () => {
    const { browser, ids } = await withPasskeys(await makePatient(database, clinicId), 1);
    expect((await remove(browser, ids[0]!)).body).toMatchObject({ passkeys: [], hasPassword: true });
  });

  it('has a second factor for staff: neither passkey nor app goes where the other is not there', async () => {
    const therapist = await makeTherapist();
    const { browser, ids } = await withPasskeys(therapist, 1);
    expect((await remove(browser, ids[0]!)).body).toMatchObject({
      detail: 'This is your only second factor. Add another passkey or an authenticator app first.',
    });
    await setUpApp(browser);
    const [passkey, app] = await Promise.all([
      remove(browser, ids[0]!),
      browser.call('delete', '/api/authenticator'),
    ]);
    expect([passkey.status, app.status].sort()).toEqual([200, 409]);
    const { passkeys, authenticator } = await waysOf(browser);
    expect(passkeys.length + Number(authenticator)).toBe(1);
  });

  it('is nobody else’s to remove: a passkey of another person looks like none', async () => {
    const [mine, theirs] = [
      await withPasskeys(await makePatient(database, clinicId), 1),
      await withPasskeys(await makePatient(database, clinicId), 1),
    ];
    expect((await remove(mine.browser, theirs.ids[0]!)).status).toBe(404);
    expect((await waysOf(theirs.browser)).passkeys).toHaveLength(1);
  });
});

describe('an account with passkeys alone', () => {
  it('answers a password like an account that does not exist', async () => {
    const patient = await makePatient(database, clinicId);
    const phone = softAuthenticator(web.url);
    await addPasskeyOn(await signInPlainly(web, patient), phone);
    await database.asSuperuser.query('update credentials set password_hash = null where person_id = $1', [
      patient.personId,
    ]);
    const known = await tryPassword(web.anonymous(), patient);
    const unknown = await tryPassword(web.anonymous(), { email: 'nobody@people.example' });
    expect([known.status, known.text]).toEqual([unknown.status, unknown.text]);
    expect((await enterWith(web, phone)).answer.status).toBe(201);
  });
});
