import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { PasskeyQuestion } from '#server/features/accounts/passkeys.ts';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
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

const therapistWithApp = async (): Promise<{ therapist: TestPerson; secret: string }> => {
  const therapist = await makePerson(database, clinicId, ['therapist']);
  return { therapist, secret: await plantAuthenticator(database, therapist) };
};

const give = (pendingId: string, code: string, way = 'authenticator') =>
  web.anonymous().call('post', '/api/session/second-factor', { pendingId, answer: { way, code } });

/** A code that is not right now, whatever the right one is. */
const wrongCodeOf = (secret: string): string =>
  String((Number(codeAt(secret, now)) + 1) % 1_000_000).padStart(6, '0');

const statuses = (answers: { status: number }[]) => answers.map(({ status }) => status).sort();

describe('staff who have an authenticator app', () => {
  it('are not in with the password alone: no session, no cookie, no audit entry', async () => {
    const { therapist } = await therapistWithApp();
    const browser = web.anonymous();
    const answer = await tryPassword(browser, therapist);
    expect([answer.status, answer.body]).toEqual([
      201,
      { next: 'second-factor', pendingId: expect.any(String) as string, ways: ['authenticator'] },
    ]);
    expect(answer.headers.getSetCookie()).toEqual([]);
    expect(await auditOf(database, therapist)).toEqual([]);
  });

  it('are in with the code of the app', async () => {
    const { therapist, secret } = await therapistWithApp();
    const answer = await give(await pendingOf(web, therapist), codeAt(secret, now));
    expect(answer.status, answer.text).toBe(201);
    expect((answer.body as { me: Me }).me).toMatchObject({
      personId: therapist.personId,
      secondFactor: 'given',
    });
    expect(await auditOf(database, therapist)).toEqual(['session.started']);
  });

  it('use each code once: neither again nor one from before it, and of many at once one gets in', async () => {
    const { therapist, secret } = await therapistWithApp();
    const before = codeAt(secret, new Date(now.getTime() - 30_000));
    const code = codeAt(secret, now);
    const pendings = await Promise.all(Array.from({ length: 4 }, () => pendingOf(web, therapist)));
    expect(statuses(await Promise.all(pendings.map((id) => give(id, code))))).toEqual([201, 401, 401, 401]);
    await database.asSuperuser.query('delete from sign_in_attempts');
    for (const spent of [code, before]) {
      expect((await give(await pendingOf(web, therapist), spent)).status).toBe(401);
    }
    passSeconds(30);
    expect((await give(await pendingOf(web, therapist), codeAt(secret, now))).status).toBe(201);
  });

  it('finish a half-done sign-in once, within five minutes', async () => {
    const { therapist, secret } = await therapistWithApp();
    const pendingId = await pendingOf(web, therapist);
    const late = await pendingOf(web, therapist);
    expect((await give(pendingId, codeAt(secret, now))).status).toBe(201);
    passSeconds(5 * 60);
    for (const id of [pendingId, late, crypto.randomUUID()]) {
      const answer = await give(id, codeAt(secret, now));
      expect([answer.status, answer.body]).toMatchObject([
        410,
        { detail: 'This sign-in took too long, or had too many tries. Please begin again.' },
      ]);
    }
  });

  it('have five tries in all, however many are sent at once', async () => {
    const { therapist, secret } = await therapistWithApp();
    const pendingId = await pendingOf(web, therapist);
    const wrong = wrongCodeOf(secret);
    const answers = await Promise.all(Array.from({ length: 20 }, () => give(pendingId, wrong)));
    expect(statuses(answers)).toEqual([...Array<number>(5).fill(401), ...Array<number>(15).fill(410)]);
    await database.asSuperuser.query('delete from sign_in_attempts');
    expect((await give(pendingId, codeAt(secret, now))).status).toBe(410);
  });

  it('get no more guesses by beginning anew: the wait is by person, and over after a right code', async () => {
    const { therapist, secret } = await therapistWithApp();
    for (let i = 0; i < 5; i += 1) {
      expect((await give(await pendingOf(web, therapist), wrongCodeOf(secret))).status).toBe(401);
    }
    const waiting = await give(await pendingOf(web, therapist), codeAt(secret, now));
    expect([waiting.status, waiting.headers.get('retry-after')]).toEqual([429, '30']);
    passSeconds(30);
    expect((await give(await pendingOf(web, therapist), codeAt(secret, now))).status).toBe(201);
    passSeconds(60);
    expect((await give(await pendingOf(web, therapist), wrongCodeOf(secret))).status).toBe(401);
    expect((await give(await pendingOf(web, therapist), codeAt(secret, now))).status).toBe(201);
  });

  it('are not in when they left between the two steps', async () => {
    const { therapist, secret } = await therapistWithApp();
    const pendingId = await pendingOf(web, therapist);
    await database.asSuperuser.query('update people set active = false where id = $1', [therapist.personId]);
    expect((await give(pendingId, codeAt(secret, now))).status).toBe(401);
  });

  it.each(['', '12345', 'not a code at all', '١٢٣٤٥٦', '1'.repeat(41)])(
    'are told that a code is none, and the server does not fail: "%s"',
    async (code) => {
      const { therapist } = await therapistWithApp();
      expect([401, 422]).toContain((await give(await pendingOf(web, therapist), code)).status);
    },
  );
});

describe('a passkey as the second factor', () => {
  const withPasskey = async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const phone = softAuthenticator(web.url);
    await addPasskeyOn(await signInPlainly(web, therapist), phone);
    return { therapist, phone };
  };
  const ask = async (pendingId: string) =>
    (await web.anonymous().call('post', '/api/session/second-factor/passkey-question', { pendingId }))
      .body as PasskeyQuestion;
  const answerWith = (pendingId: string, passkey: unknown) =>
    web
      .anonymous()
      .call('post', '/api/session/second-factor', { pendingId, answer: { way: 'passkey', passkey } });

  it('is asked for by its own id and lets staff in', async () => {
    const { therapist, phone } = await withPasskey();
    const pendingId = await pendingOf(web, therapist);
    const question = await ask(pendingId);
    expect(question.options.allowCredentials).toHaveLength(1);
    const answer = await answerWith(pendingId, phone.answer(question));
    expect((answer.body as { me: Me }).me.secondFactor).toBe('given');
  });

  it('is not that of a colleague, and not the answer to another question', async () => {
    const [one, other] = [await withPasskey(), await withPasskey()];
    const pendingId = await pendingOf(web, one.therapist);
    const question = await ask(pendingId);
    const foreign = other.phone.answer({
      ...question,
      options: { ...question.options, allowCredentials: [] },
    });
    expect((await answerWith(pendingId, foreign)).status).toBe(401);
    const toEnter = await web.anonymous().call('post', '/api/session/passkey-question');
    const misplaced = one.phone.answer(toEnter.body as PasskeyQuestion);
    expect((await answerWith(pendingId, misplaced)).status).toBe(401);
  });
});

describe('staff without a second factor', () => {
  it('may set one up and sign out, and do nothing else', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const browser = await signInPlainly(web, therapist);
    expect(browser.me?.secondFactor).toBe('missing');
    for (const path of ['/api/flags', '/api/threads', '/api/sessions']) {
      const answer = await browser.call('get', path);
      expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:second-factor-needed', status: 403 });
    }
    expect((await browser.call('get', '/api/ways-in')).status).toBe(200);
    expect((await browser.call('post', '/api/session/activity')).status).toBe(200);
    expect((await browser.call('delete', '/api/session')).status).toBe(204);
  });

  it('go on without signing in again once they added a passkey', async () => {
    const browser = await signInPlainly(web, await makePerson(database, clinicId, ['therapist']));
    expect((await addPasskeyOn(browser, softAuthenticator(web.url))).status).toBe(201);
    expect((await browser.call('get', '/api/flags')).status).toBe(200);
  });

  it('go on once they confirmed an authenticator app', async () => {
    const browser = await signInPlainly(web, await makePerson(database, clinicId, ['therapist']));
    const { secret } = (await browser.call('post', '/api/authenticator')).body as { secret: string };
    expect((await browser.call('get', '/api/flags')).status).toBe(403);
    const code = codeAt(secret, now);
    expect((await browser.call('post', '/api/authenticator/confirmation', { code })).status).toBe(200);
    expect((await browser.call('get', '/api/flags')).status).toBe(200);
  });

  it('add none in a session that the password opened before they had one', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const thief = await signInPlainly(web, therapist);
    await plantAuthenticator(database, therapist);
    const asked = [
      await thief.call('post', '/api/passkeys/question'),
      await thief.call('post', '/api/authenticator'),
      await thief.call('post', '/api/authenticator/confirmation', { code: '123456' }),
    ];
    for (const answer of asked) {
      expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:second-factor-needed' });
    }
  });
});

it('is not asked of a patient who has a passkey and uses the password', async () => {
  const patient = await makePatient(database, clinicId);
  await addPasskeyOn(await signInPlainly(web, patient), softAuthenticator(web.url));
  expect((await tryPassword(web.anonymous(), patient)).body).toMatchObject({ next: 'none' });
});
