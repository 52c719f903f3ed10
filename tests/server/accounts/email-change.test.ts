import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { linkTokenOf } from '#server/features/accounts/one-time-tokens.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  testPassword,
  type TestPatient,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { auditOf, mailsTo, signInPlainly, tryPassword } from './ways.ts';

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

const newAddress = () => `${randomUUID()}@new.example`;
const ask = (browser: TestBrowser, email: string) => browser.call('post', '/api/email-changes', { email });
const use = (token: string) => web.anonymous().call('post', '/api/email-changes/use', { token });

const newestToken = async (person: { personId: string }): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    `select id from one_time_tokens
     where person_id = $1 and kind = 'email-change' and used_at is null and revoked_at is null`,
    [person.personId],
  );
  return linkTokenOf(testSecrets.tokenSecret, rows[0]!.id);
};

const addressesOf = async ({ personId }: TestPatient) => {
  const { rows } = await database.asSuperuser.query<{
    person: string;
    account: string;
    bounced: Date | null;
  }>(
    `select p.email as person, c.email as account, p.email_bounced_at as bounced
     from people p join credentials c on c.person_id = p.id where p.id = $1`,
    [personId],
  );
  return rows[0];
};

describe('a change of address', () => {
  it('holds once the link of the mail is opened, for signing in and for mail alike', async () => {
    const patient = await makePatient(database, clinicId);
    await database.asSuperuser.query('update people set email_bounced_at = now() where id = $1', [
      patient.personId,
    ]);
    const browser = await signInPlainly(web, patient);
    const email = newAddress();
    const asked = await ask(browser, `  ${email.toUpperCase()} `);
    expect(asked.status, asked.text).toBe(200);
    expect(asked.body as WaysIn).toMatchObject({ email: patient.email, pendingEmail: email });
    expect(await addressesOf(patient)).toMatchObject({ person: patient.email, account: patient.email });

    const token = await newestToken(patient);
    const id = token.split('.')[0];
    const mails = await mailsTo(database, patient);
    expect(mails.find(({ kind }) => kind === 'email-change')).toEqual({
      kind: 'email-change',
      path: `/confirm-email#${id}`,
      occasion: `email-change:${id}`,
    });
    // The owner is told while mail still goes to the old address.
    expect(mails.map(({ kind }) => kind)).toContain('sign-in-changed');

    expect((await use(token)).status).toBe(204);
    expect(await addressesOf(patient)).toEqual({ person: email, account: email, bounced: null });
    expect(await auditOf(database, patient)).toEqual([
      'email-change.asked',
      'email.changed',
      'session.started',
    ]);
    expect((await browser.call('get', '/api/ways-in')).body).toMatchObject({ email, pendingEmail: null });
    expect((await tryPassword(web.anonymous(), patient)).status).toBe(401);
    expect((await tryPassword(web.anonymous(), { email }, testPassword)).status).toBe(201);
  });

  it('is refused in the same words for an address that anybody has, here or elsewhere', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    const colleague = await makePerson(database, clinicId, ['therapist']);
    const elsewhere = await makePerson(database, await makeClinic(database), ['therapist']);
    const invited = await makePatient(database, clinicId);
    await database.asSuperuser.query('delete from credentials where person_id = $1', [invited.personId]);
    for (const { email } of [patient, colleague, elsewhere, invited]) {
      const answer = await ask(browser, email);
      expect([answer.status, answer.body]).toMatchObject([
        422,
        { errors: [{ field: 'email', message: 'That address cannot be used here.' }] },
      ]);
    }
    expect((await mailsTo(database, patient)).filter(({ kind }) => kind === 'email-change')).toEqual([]);
  });

  it('is refused where somebody took the address in between, and changes nothing', async () => {
    const patient = await makePatient(database, clinicId);
    const email = newAddress();
    await ask(await signInPlainly(web, patient), email);
    const other = await makePerson(database, clinicId, ['therapist']);
    await database.asSuperuser.query('update credentials set email = $1 where person_id = $2', [
      email,
      other.personId,
    ]);
    const answer = await use(await newestToken(patient));
    expect([answer.status, answer.body]).toMatchObject([
      409,
      { detail: 'That address cannot be used here.' },
    ]);
    expect(await addressesOf(patient)).toMatchObject({ person: patient.email, account: patient.email });
    expect(await auditOf(database, patient)).not.toContain('email.changed');
  });

  it('has one link that holds, once and for an hour', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    await ask(browser, newAddress());
    const first = await newestToken(patient);
    const email = newAddress();
    await ask(browser, email);
    expect((await use(first)).status).toBe(410);
    const second = await newestToken(patient);
    const answers = await Promise.all(Array.from({ length: 8 }, () => use(second)));
    expect(answers.map(({ status }) => status).sort()).toEqual([204, ...Array<number>(7).fill(410)]);
    expect(await addressesOf(patient)).toMatchObject({ account: email });
    await ask(browser, newAddress());
    const late = await newestToken(patient);
    now = new Date(now.getTime() + 60 * 60_000);
    expect((await use(late)).status).toBe(410);
    expect((await use('not.a-token')).status).toBe(410);
  });

  it('comes to nothing when the owner, who was told of it, chooses a new password', async () => {
    const patient = await makePatient(database, clinicId);
    await ask(await signInPlainly(web, patient), newAddress());
    const token = await newestToken(patient);
    await web.anonymous().call('post', '/api/password-resets', { email: patient.email });
    const { rows } = await database.asSuperuser.query<{ id: string }>(
      `select id from one_time_tokens where person_id = $1 and kind = 'password-reset'`,
      [patient.personId],
    );
    const reset = linkTokenOf(testSecrets.tokenSecret, rows[0]!.id);
    const body = { token: reset, password: 'nine herons over the pond' };
    expect((await web.anonymous().call('post', '/api/password-resets/use', body)).status).toBe(204);
    expect((await use(token)).status).toBe(410);
    expect(await addressesOf(patient)).toMatchObject({ person: patient.email, account: patient.email });
  });

  it('mails three links an hour at most', async () => {
    const patient = await makePatient(database, clinicId);
    const browser = await signInPlainly(web, patient);
    for (let i = 0; i < 3; i += 1) expect((await ask(browser, newAddress())).status).toBe(200);
    const answer = await ask(browser, newAddress());
    expect([answer.status, answer.headers.get('retry-after')]).toEqual([429, '3600']);
    expect((await mailsTo(database, patient)).filter(({ kind }) => kind === 'email-change')).toHaveLength(3);
  });

  it('needs a fresh proof', async () => {
    const browser = await signInPlainly(web, await makePatient(database, clinicId));
    now = new Date(now.getTime() + 5 * 60_000 + 1);
    expect((await ask(browser, newAddress())).body).toMatchObject({
      type: 'urn:espalier:problem:proof-needed',
    });
  });

  it.each(['', 'no address', 'two@signs@here.example', 'a b@c.example', `${'x'.repeat(250)}@c.example`])(
    'is refused beside its field for what is no address: "%s"',
    async (email) => {
      const browser = await signInPlainly(web, await makePatient(database, clinicId));
      const answer = await ask(browser, email);
      expect(answer.status).toBe(422);
      const { errors } = answer.body as { errors: { field: string }[] };
      expect(new Set(errors.map(({ field }) => field))).toEqual(new Set(['email']));
    },
  );
});
