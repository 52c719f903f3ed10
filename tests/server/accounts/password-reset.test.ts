import { createHash, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { linkTokenOf } from '#server/features/accounts/one-time-tokens.ts';
import { makeClinic, makePatient, makePerson, testPassword, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { auditOf, mailsTo, pendingOf, plantAuthenticator, signInPlainly, tryPassword } from './ways.ts';

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

const password = 'nine herons over the pond';
const ask = (email: string) => web.anonymous().call('post', '/api/password-resets', { email });
const use = (token: string, chosen = password) =>
  web.anonymous().call('post', '/api/password-resets/use', { token, password: chosen });

const resetMails = async (person: { personId: string }) =>
  (await mailsTo(database, person)).filter(({ kind }) => kind === 'password-reset');

/** The token as the mail carries it: its row names the id alone. */
const tokenFor = async (person: TestPerson): Promise<string> => {
  const before = (await resetMails(person)).map(({ path }) => path);
  expect((await ask(person.email)).status).toBe(204);
  const path = (await resetMails(person)).map((mail) => mail.path).find((one) => !before.includes(one)) ?? '';
  expect(path).toMatch(/^\/reset-password#[0-9a-f-]{36}$/);
  return linkTokenOf(testSecrets.tokenSecret, path.split('#')[1]!);
};

const isSpent = ({ status, body }: { status: number; body: unknown }) => {
  expect([status, body]).toEqual([
    410,
    {
      type: 'urn:espalier:problem:link-spent',
      title: 'This link or code can no longer be used.',
      status: 410,
    },
  ]);
};

describe('asking for a reset', () => {
  it('mails a link whose row holds no secret', async () => {
    const patient = await makePatient(database, clinicId);
    const token = await tokenFor(patient);
    const [mail] = await resetMails(patient);
    expect(mail?.occasion).toBe(`reset:${token.split('.')[0]}`);
    const { rows } = await database.asSuperuser.query<{ text: string }>(
      `select (select jsonb_agg(t)::text from one_time_tokens t) || (select jsonb_agg(n)::text from notifications n) as text`,
    );
    expect(rows[0]?.text).not.toContain(token.split('.')[1]);
  });

  it('is answered alike, and no sooner, for known, unknown, invited, left and ended', async () => {
    const known = await makePatient(database, clinicId);
    const [left, ended] = [await makePatient(database, clinicId), await makePatient(database, clinicId)];
    const invited = await makePatient(database, clinicId);
    await database.asSuperuser.query('update people set active = false where id = $1', [left.personId]);
    await database.asSuperuser.query(`update patients set state = 'ended' where id = $1`, [ended.patientId]);
    await database.asSuperuser.query('delete from credentials where person_id = $1', [invited.personId]);
    for (const { email } of [known, left, ended, invited, { email: 'nobody@people.example' }]) {
      const startedAt = performance.now();
      const answer = await ask(email);
      expect([answer.status, answer.text]).toEqual([204, '']);
      expect(performance.now() - startedAt).toBeGreaterThan(245);
    }
    for (const person of [left, ended, invited]) expect(await mailsTo(database, person)).toEqual([]);
    expect(await resetMails(known)).toHaveLength(1);
  });

  it('does its work for ten of many askings at once, for known and unknown alike, so that none is slower', async () => {
    const { email } = await makePatient(database, clinicId);
    for (const asked of [email, `${randomUUID()}@people.example`]) {
      await Promise.all(Array.from({ length: 30 }, () => ask(asked)));
      const key = createHash('sha256').update(`reset:${asked}`).digest('base64url');
      const { rows } = await database.asSuperuser.query(
        'select failures from sign_in_attempts where email_hash = $1',
        [key],
      );
      expect(rows).toEqual([{ failures: 10 }]);
    }
  });

  it('sends three mails an hour at most, also to many requests at once, and says nothing of it', async () => {
    const patient = await makePatient(database, clinicId);
    const answers = await Promise.all(Array.from({ length: 12 }, () => ask(patient.email)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([204]));
    expect(await resetMails(patient)).toHaveLength(3);
    passMinutes(60);
    await ask(patient.email);
    expect(await resetMails(patient)).toHaveLength(4);
  });
});

describe('the link', () => {
  it('changes the password, ends every session, tells the owner, and does not sign in', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    const { ended } = await browser.socket();
    const answer = await use(await tokenFor(patient));
    expect([answer.status, answer.headers.getSetCookie()]).toEqual([204, []]);
    await ended;
    expect((await browser.call('get', '/api/ways-in')).status).toBe(401);
    expect((await tryPassword(web.anonymous(), patient, testPassword)).status).toBe(401);
    expect((await tryPassword(web.anonymous(), patient, password)).status).toBe(201);
    expect(await auditOf(database, patient)).toContain('password.reset');
    expect((await mailsTo(database, patient)).map(({ kind }) => kind)).toContain('sign-in-changed');
  });

  it('leaves the second factor of staff as it is', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    await plantAuthenticator(database, therapist);
    expect((await use(await tokenFor(therapist))).status).toBe(204);
    expect((await tryPassword(web.anonymous(), therapist, password)).body).toMatchObject({
      next: 'second-factor',
      ways: ['authenticator'],
    });
  });

  it('has the half-done sign-ins of the old password come to nothing', async () => {
    const therapist = await makePerson(database, clinicId, ['therapist']);
    await plantAuthenticator(database, therapist);
    const pendingId = await pendingOf(web, therapist);
    await use(await tokenFor(therapist));
    const asked = await web
      .anonymous()
      .call('post', '/api/session/second-factor/passkey-question', { pendingId });
    expect(asked.status).toBe(410);
  });

  it('ends the wait after failures: whoever reads the mailbox may sign in', async () => {
    const patient = await makePatient(database, clinicId);
    for (let i = 0; i < 5; i += 1) await tryPassword(web.anonymous(), patient, 'wrong');
    expect((await tryPassword(web.anonymous(), patient)).status).toBe(429);
    await use(await tokenFor(patient));
    expect((await tryPassword(web.anonymous(), patient, password)).status).toBe(201);
  });

  it('works once and for an hour, and one spends those that were mailed before it', async () => {
    const patient = await makePatient(database, clinicId);
    const [first, second] = [await tokenFor(patient), await tokenFor(patient)];
    expect((await use(second)).status).toBe(204);
    isSpent(await use(second));
    isSpent(await use(first));
    const late = await tokenFor(patient);
    passMinutes(60);
    isSpent(await use(late));
  });

  it('is refused in the same words when it was never made here, or for something else', async () => {
    const patient = await makePatient(database, clinicId);
    const real = await tokenFor(patient);
    const id = randomUUID();
    await database.asSuperuser.query(
      `insert into one_time_tokens (id, clinic_id, person_id, kind, created_at, expires_at)
       values ($1, $2, $3, 'email-change', $4, $5)`,
      [id, clinicId, patient.personId, now, new Date(now.getTime() + 60_000)],
    );
    const { tokenSecret } = testSecrets;
    const strange = [
      '',
      'x',
      `${real}x`,
      `${real.slice(0, -1)}${real.endsWith('A') ? 'B' : 'A'}`,
      linkTokenOf(tokenSecret, id),
      linkTokenOf(tokenSecret, randomUUID()),
      linkTokenOf('another secret of thirty-two characters', real.split('.')[0]!),
    ];
    for (const token of strange) isSpent(await use(token));
    expect((await use(real)).status).toBe(204);
  });

  it('is not used up by a password that is refused', async () => {
    const patient = await makePatient(database, clinicId);
    const token = await tokenFor(patient);
    for (const bad of ['short', 'passwordpassword']) {
      const answer = await use(token, bad);
      expect(answer.status).toBe(422);
      expect(answer.body).toMatchObject({ errors: [{ field: 'password' }] });
    }
    expect((await use(token)).status).toBe(204);
  });

  it('has one winner of 16 uses at once, for each of 20 links, whose password it is then', async () => {
    for (let i = 0; i < 20; i += 1) {
      const patient = await makePatient(database, clinicId);
      const token = await tokenFor(patient);
      const chosen = Array.from({ length: 16 }, (_, index) => `kettle number ${index} sings aloud`);
      const answers = await Promise.all(chosen.map((one) => use(token, one)));
      const winners = chosen.filter((_, index) => answers[index]?.status === 204);
      expect(winners).toHaveLength(1);
      expect(answers.filter(({ status }) => status === 410)).toHaveLength(15);
      expect((await tryPassword(web.anonymous(), patient, winners[0])).status).toBe(201);
    }
  }, 120_000);
});
