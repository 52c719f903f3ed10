import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import type { PasskeyQuestion } from '#server/features/accounts/passkeys.ts';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { addPasskeyOn, askToEnter, auditOf, enterWith, mailsTo, signInPlainly } from './ways.ts';

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

const pass = (ms: number) => {
  now = new Date(now.getTime() + ms);
};

const phoneOf = async (person: TestPerson) => {
  const phone = softAuthenticator(web.url);
  const browser = await signInPlainly(web, person);
  const answer = await addPasskeyOn(browser, phone);
  expect(answer.status, answer.text).toBe(201);
  return { phone, browser, ways: answer.body as WaysIn };
};

const wrongCode = {
  type: 'urn:espalier:problem:wrong-code',
  title: 'That code or passkey is not right.',
  status: 401,
};

describe('a passkey', () => {
  it('signs a patient in without a name or a password, and notes its use', async () => {
    const patient = await makePatient(database, clinicId);
    const { phone, ways } = await phoneOf(patient);
    expect(ways.passkeys).toMatchObject([{ lastUsedAt: null, createdAt: now.toISOString() }]);
    pass(60_000);
    const { answer, browser } = await enterWith(web, phone);
    expect(answer.status, answer.text).toBe(201);
    expect((answer.body as { me: Me }).me).toMatchObject({
      personId: patient.personId,
      secondFactor: 'not-needed',
    });
    const after = (await browser.call('get', '/api/ways-in')).body as WaysIn;
    expect(after.passkeys).toMatchObject([{ lastUsedAt: now.toISOString() }]);
    expect(await auditOf(database, patient)).toEqual(['passkey.added', 'session.started', 'session.started']);
    expect(await mailsTo(database, patient)).toMatchObject([
      { kind: 'sign-in-changed', path: '/account/sign-in' },
    ]);
  });

  it('lets staff in wholly: it is something they have and something they are', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const { phone } = await phoneOf(therapist);
    const { answer, browser } = await enterWith(web, phone);
    expect((answer.body as { me: Me }).me.secondFactor).toBe('given');
    expect((await browser.call('get', '/api/flags')).status).toBe(200);
  });

  it('asks for a question that names nobody, and for the owner to be verified', async () => {
    const { options } = await askToEnter(web);
    expect(options).toMatchObject({ rpId: 'localhost', userVerification: 'required', allowCredentials: [] });
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    const question = (await browser.call('post', '/api/passkeys/question')).body as PasskeyQuestion;
    expect(question.options).toMatchObject({
      attestation: 'none',
      authenticatorSelection: { residentKey: 'required', userVerification: 'required' },
    });
  });
});

describe('making a passkey is refused', () => {
  it.each([
    ['for another site', { origin: 'https://elsewhere.example' }],
    ['for another challenge', { challenge: 'AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA' }],
    ['without the owner having been verified', { unverified: true as const }],
  ])('%s', async (_what, misuse) => {
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    const answer = await addPasskeyOn(browser, softAuthenticator(web.url), misuse);
    expect([answer.status, answer.body]).toEqual([401, wrongCode]);
    expect(((await browser.call('get', '/api/ways-in')).body as WaysIn).passkeys).toEqual([]);
  });

  it('a second time for the same question, and after five minutes', async () => {
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    const ask = async () => (await browser.call('post', '/api/passkeys/question')).body as PasskeyQuestion;
    const send = (question: PasskeyQuestion) =>
      browser.call('post', '/api/passkeys', { passkey: softAuthenticator(web.url).register(question) });
    const question = await ask();
    expect((await send(question)).status).toBe(201);
    expect((await send(question)).status).toBe(401);
    const late = await ask();
    pass(5 * 60_000);
    expect((await send(late)).status).toBe(401);
  });

  it('for the question of somebody else', async () => {
    const [one, other] = [await makePatient(database, clinicId), await makePatient(database, clinicId)];
    const [first, second] = [await signInPlainly(web, one), await signInPlainly(web, other)];
    const question = (await first.call('post', '/api/passkeys/question')).body as PasskeyQuestion;
    const passkey = softAuthenticator(web.url).register(question);
    expect((await second.call('post', '/api/passkeys', { passkey })).status).toBe(401);
    expect((await first.call('post', '/api/passkeys', { passkey })).status).toBe(201);
  });

  it('with a credential that is in use, also by somebody else, in plain words', async () => {
    const credentialId = Buffer.from('the same credential twice');
    const [one, other] = [await makePatient(database, clinicId), await makePatient(database, clinicId)];
    const first = await signInPlainly(web, one);
    const second = await signInPlainly(web, other);
    const misuse = { credentialId };
    expect((await addPasskeyOn(first, softAuthenticator(web.url), misuse)).status).toBe(201);
    for (const browser of [first, second]) {
      const answer = await addPasskeyOn(browser, softAuthenticator(web.url), misuse);
      expect([answer.status, (answer.body as { detail: string }).detail]).toEqual([
        409,
        'This passkey is in use already. Make a new one, or sign in with it.',
      ]);
    }
  });

  it('without a fresh proof of who asks', async () => {
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    pass(5 * 60_000 + 1);
    const answer = await browser.call('post', '/api/passkeys/question');
    expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:proof-needed', status: 403 });
  });
});

describe('signing in with a passkey is refused', () => {
  it.each([
    ['from another site', { origin: 'https://elsewhere.example' }],
    ['for another challenge', { challenge: 'AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA' }],
    ['without the owner having been verified', { unverified: true as const }],
    ['with a counter that went back', { counter: 4 }],
    ['with a counter that stood still', { counter: 5 }],
    ['with a counter that fell to nothing', { counter: 0 }],
    ['where the device says it is somebody else', { userHandle: 'bm9ib2R5' }],
  ])('%s', async (_what, misuse) => {
    const { phone } = await phoneOf(await makePatient(database, clinicId));
    expect((await enterWith(web, phone, { counter: 5 })).answer.status).toBe(201);
    const { answer } = await enterWith(web, phone, misuse);
    expect([answer.status, answer.body]).toEqual([401, wrongCode]);
    expect(answer.headers.getSetCookie()).toEqual([]);
    expect((await enterWith(web, phone, { counter: 6 })).answer.status).toBe(201);
  });

  it('when the answer is sent again, also by many at once', async () => {
    const { phone } = await phoneOf(await makePatient(database, clinicId));
    const passkey = phone.answer(await askToEnter(web));
    const answers = await Promise.all(
      Array.from({ length: 16 }, () => web.anonymous().call('post', '/api/session/passkey', { passkey })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, ...Array<number>(15).fill(401)]);
  });

  it.each([{}, { id: 'AAAA' }, { id: 7, response: null }, { id: '\ufffd', response: { userHandle: [] } }])(
    'with the same words for what is no answer at all: %j',
    async (response) => {
      const { challengeId } = await askToEnter(web);
      const passkey = { challengeId, response };
      const answer = await web.anonymous().call('post', '/api/session/passkey', { passkey });
      expect([answer.status, answer.body]).toEqual([401, wrongCode]);
    },
  );

  it('to whoever has left and to a patient whose care has ended, with the same bytes', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    const patient = await makePatient(database, clinicId);
    const [left, ended] = [await phoneOf(therapist), await phoneOf(patient)];
    await database.asSuperuser.query('update people set active = false where id = $1', [therapist.personId]);
    await database.asSuperuser.query(`update patients set state = 'ended' where id = $1`, [
      patient.patientId,
    ]);
    for (const { phone } of [left, ended]) {
      const { answer } = await enterWith(web, phone);
      expect([answer.status, answer.body]).toEqual([401, wrongCode]);
    }
    const wrong = await web.anonymous().call('post', '/api/session', {
      email: patient.email,
      password: 'a long test passphrase',
    });
    expect(wrong.body).toMatchObject({ type: 'urn:espalier:problem:wrong-sign-in', status: 401 });
  });
});

it('keeps two people on one phone apart: each comes in as themselves', async () => {
  const [mina, otto] = [await makePatient(database, clinicId), await makePatient(database, clinicId)];
  const phone = softAuthenticator(web.url);
  for (const person of [mina, otto]) {
    expect((await addPasskeyOn(await signInPlainly(web, person), phone)).status).toBe(201);
  }
  for (const { personId } of [mina, otto]) {
    const { answer } = await enterWith(web, phone, { personId });
    expect((answer.body as { me: Me }).me.personId).toBe(personId);
  }
});
