import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { makeClinic, makePatient, makePerson, testPassword } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import {
  addPasskeyOn,
  auditOf,
  codeAt,
  pendingOf,
  plantAuthenticator,
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

const give = (pendingId: string, code: string) =>
  web.anonymous().call('post', '/api/session/second-factor', {
    pendingId,
    answer: { way: 'authenticator', code },
  });

describe('a new password', () => {
  const password = 'seven kettles under a maple';

  it('ends every other session, keeps this one, and what the old one had begun comes to nothing', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const browser = await signInPlainly(web, therapist);
    const { secret } = (await browser.call('post', '/api/authenticator')).body as { secret: string };
    await browser.call('post', '/api/authenticator/confirmation', { code: codeAt(secret, now) });
    passSeconds(30);
    const other = web.anonymous();
    const answer = { way: 'authenticator', code: codeAt(secret, now) };
    const pendingId = await pendingOf(web, therapist);
    await other.call('post', '/api/session/second-factor', { pendingId, answer });
    const halfDone = await pendingOf(web, therapist);
    expect((await browser.call('put', '/api/password', { password })).status).toBe(200);
    expect((await browser.call('get', '/api/ways-in')).status).toBe(200);
    expect((await other.call('get', '/api/ways-in')).status).toBe(401);
    passSeconds(30);
    expect((await give(halfDone, codeAt(secret, now))).status).toBe(410);
    expect((await tryPassword(web.anonymous(), therapist, testPassword)).status).toBe(401);
    expect((await tryPassword(web.anonymous(), therapist, password)).status).toBe(201);
    expect(await auditOf(database, therapist)).toContain('password.changed');
  });

  it('is refused beside its field where it is short or common, and nothing changes', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    for (const bad of ['too short', 'passwordpassword', patient.email]) {
      const answer = await browser.call('put', '/api/password', { password: bad });
      expect(answer.status).toBe(422);
      expect((answer.body as { errors: { field: string }[] }).errors).toMatchObject([{ field: 'password' }]);
    }
    expect((await tryPassword(web.anonymous(), patient)).status).toBe(201);
  });
});

describe('a proof', () => {
  it('by password, code or passkey opens sensitive acts for five minutes', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    const phone = softAuthenticator(web.url);
    await addPasskeyOn(browser, phone);
    const secret = await plantAuthenticator(database, patient);
    const act = async () => (await browser.call('post', '/api/passkeys/question')).status;
    const question = async () =>
      (await browser.call('post', '/api/session/proof/passkey-question')).body as never;
    const answers = [
      async () => ({ way: 'password', password: testPassword }),
      async () => ({ way: 'authenticator', code: codeAt(secret, now) }),
      async () => ({ way: 'passkey', passkey: phone.answer(await question()) }),
    ];
    for (const answer of answers) {
      passSeconds(5 * 60 + 1);
      expect(await act()).toBe(403);
      const proven = await browser.call('post', '/api/session/proof', await answer());
      expect(proven.status, proven.text).toBe(204);
      passSeconds(5 * 60);
      expect(await act()).toBe(200);
      // A proof is no activity; the idle clock would end the session before the third.
      await browser.call('post', '/api/session/activity');
    }
    expect((await auditOf(database, patient)).filter((action) => action === 'session.proven')).toHaveLength(
      3,
    );
  });

  it('is refused and counted like a sign-in when it is wrong', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    const prove = (password: string) =>
      browser.call('post', '/api/session/proof', { way: 'password', password });
    for (let i = 0; i < 5; i += 1) expect((await prove('wrong')).status).toBe(401);
    expect((await prove(testPassword)).status).toBe(429);
    expect((await tryPassword(web.anonymous(), patient)).status).toBe(429);
  });

  it('is not given by the passkey of somebody else', async () => {
    const [mine, theirs] = [await makePatient(database, clinicId), await makePatient(database, clinicId)];
    const browser = await signInPlainly(web, mine);
    const phone = softAuthenticator(web.url);
    await addPasskeyOn(await signInPlainly(web, theirs), phone);
    const question = (await browser.call('post', '/api/session/proof/passkey-question')).body as never;
    const passkey = phone.answer(question);
    expect((await browser.call('post', '/api/session/proof', { way: 'passkey', passkey })).status).toBe(401);
  });
});
