import { randomUUID } from 'node:crypto';
import { beginAuthenticator } from '#server/features/accounts/authenticators.ts';
import { codeHashOf, issueToken, linkTokenOf } from '#server/features/accounts/one-time-tokens.ts';
import { askAssertion } from '#server/features/accounts/passkey-assertions.ts';
import { askRegistration, keepPasskey, verifyRegistration } from '#server/features/accounts/passkeys.ts';
import { beginPendingSignIn } from '#server/features/accounts/pending-sign-ins.ts';
import type { Site } from '#server/http/site.ts';
import { softAuthenticator } from '#tests/support/authenticator.ts';
import { testPassword, type TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { codeAt, plantAuthenticator } from '../accounts/ways.ts';
import { nothing, type RouteFixture } from './fixture.ts';

const siteOf = ({ pools }: TestDatabase, publicUrl: string): Site => ({
  gate: pools.gate,
  publicUrl,
  ...testSecrets,
});

/** The instant at which the web under test stands: that of its first session. */
const webNow = async ({ asSuperuser }: TestDatabase): Promise<Date> => {
  const { rows } = await asSuperuser.query<{ at: Date }>(
    'select min(started_at) as at from signed_in_sessions',
  );
  return rows[0]?.at ?? new Date();
};

/** A phone with a passkey of that person. */
const plantPasskey = async (site: Site, person: TestPerson) => {
  const now = new Date();
  const phone = softAuthenticator(site.publicUrl);
  const answer = phone.register(await askRegistration(site, person, now));
  await keepPasskey(
    site.gate,
    person,
    await verifyRegistration(site, person.personId, answer, now),
    'Phone',
    now,
  );
  return phone;
};

const plantedPasskeyId = async ({ asSuperuser }: TestDatabase, { personId }: TestPerson): Promise<string> => {
  const { rows } = await asSuperuser.query<{ id: string }>(
    'select id from passkeys where person_id = $1 order by created_at desc limit 1',
    [personId],
  );
  return rows[0]!.id;
};

/** A device elsewhere on which that person is signed in. */
const plantSession = async (
  { asSuperuser }: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const { rows } = await asSuperuser.query<{ id: string }>(
    `insert into signed_in_sessions (clinic_id, person_id, started_at, last_activity_at, ends_at)
     values ($1, $2, now(), now(), now() + interval '1 day') returning id`,
    [clinicId, personId],
  );
  return rows[0]!.id;
};

const plantRecoveryCode = async (
  { asSuperuser }: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const code = randomUUID();
  await asSuperuser.query(
    'insert into recovery_codes (clinic_id, person_id, code_hash) values ($1, $2, $3)',
    [clinicId, personId, codeHashOf(testSecrets.sealSecret, code)],
  );
  return code;
};

const tokenFor = async (
  { pools }: TestDatabase,
  { clinicId, personId, email }: TestPerson,
  kind: 'password-reset' | 'email-change',
): Promise<string> => {
  const id = randomUUID();
  const expiresAt = new Date(Date.now() + 3_600_000);
  await issueToken(pools.gate, { id, clinicId, personId, kind, expiresAt, email }, new Date(0));
  return linkTokenOf(testSecrets.tokenSecret, id);
};

/** Whoever is asked for is a patient: a role that looks after them has no hand in how they sign in. */
const patientsOwn: RouteFixture['door'] = (role, relation) => role === 'patient' && relation === 'own';

const startsSession = { writes: 'session.started', endsSession: true } as const;

/** The ways in, the sessions that they open, and what changes them. */
export const accountFixtures: Record<string, RouteFixture> = {
  'get /api/session': { request: nothing },
  'post /api/session': {
    request: async (_database, { actor }) => ({ body: { email: actor.email, password: testPassword } }),
    ...startsSession,
  },
  'post /api/session/second-factor/passkey-question': {
    request: async ({ pools }, { actor }) => ({
      body: { pendingId: await beginPendingSignIn(pools.gate, actor, new Date()) },
    }),
  },
  'post /api/session/second-factor': {
    request: async (database, { actor }) => {
      const pendingId = await beginPendingSignIn(database.pools.gate, actor, new Date());
      const code = await plantRecoveryCode(database, actor);
      return { body: { pendingId, answer: { way: 'recovery-code', code } } };
    },
    ...startsSession,
  },
  'post /api/session/passkey-question': { request: nothing },
  'post /api/session/passkey': {
    request: async (database, { actor, origin }) => {
      const site = siteOf(database, origin);
      const phone = await plantPasskey(site, actor);
      const question = await askAssertion(site, { purpose: 'sign-in', personId: null }, new Date());
      return { body: { passkey: phone.answer(question) } };
    },
    ...startsSession,
  },
  'delete /api/session': { request: nothing, endsSession: true },
  'post /api/session/activity': { request: nothing },
  'post /api/session/proof/passkey-question': { request: nothing },
  'post /api/session/proof': { request: async () => ({ body: { way: 'password', password: testPassword } }) },
  'get /api/sessions': { request: nothing },
  'delete /api/sessions/:sessionId': {
    param: 'sessionId',
    door: patientsOwn,
    request: async (database, { owner }) => ({ id: await plantSession(database, owner) }),
  },
  'delete /api/sessions': { request: nothing },

  'get /api/ways-in': { request: nothing },
  'post /api/passkeys/question': { request: nothing },
  'post /api/passkeys': {
    request: async (database, { actor, origin }) => {
      const question = await askRegistration(siteOf(database, origin), actor, new Date());
      return { body: { passkey: softAuthenticator(origin).register(question) } };
    },
  },
  'delete /api/passkeys/:passkeyId': {
    param: 'passkeyId',
    door: patientsOwn,
    request: async (database, { owner, origin }) => {
      await plantPasskey(siteOf(database, origin), owner);
      return { id: await plantedPasskeyId(database, owner) };
    },
  },
  'post /api/authenticator': { request: nothing },
  'post /api/authenticator/confirmation': {
    request: async (database, { actor, origin }) => {
      const secret = await beginAuthenticator(siteOf(database, origin), actor);
      return { body: { code: codeAt(secret, await webNow(database)) } };
    },
  },
  'delete /api/authenticator': {
    request: async (database, { actor, origin }) => {
      await plantAuthenticator(database, actor);
      await plantPasskey(siteOf(database, origin), actor);
      return {};
    },
  },
  'post /api/recovery-codes': {
    request: async (database, { actor }) => {
      await plantAuthenticator(database, actor);
      return {};
    },
  },
  'put /api/password': { request: async () => ({ body: { password: testPassword } }) },
  'post /api/password-resets': {
    request: async (_database, { actor }) => ({ body: { email: actor.email } }),
  },
  'post /api/password-resets/use': {
    request: async (database, { actor }) => ({
      body: { token: await tokenFor(database, actor, 'password-reset'), password: testPassword },
    }),
    writes: 'password.reset',
    endsSession: true,
  },
  'post /api/email-changes': { request: async () => ({ body: { email: `${randomUUID()}@new.example` } }) },
  // To the address that they have, so that the rest of the table finds them by it.
  'post /api/email-changes/use': {
    request: async (database, { actor }) => ({
      body: { token: await tokenFor(database, actor, 'email-change') },
    }),
    writes: 'email.changed',
  },
};
