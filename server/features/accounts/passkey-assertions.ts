import {
  generateAuthenticationOptions,
  verifyAuthenticationResponse,
  type AuthenticationResponseJSON,
} from '@simplewebauthn/server';
import { and, eq, lt, or, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { passkeys } from '../../db/schema/gate.ts';
import type { Site } from '../../http/site.ts';
import type { Gate } from './one-time-tokens.ts';
import { keepChallenge, takeChallenge, type ChallengePurpose } from './passkey-challenges.ts';
import { relyingParty, userHandleOf, type PasskeyAnswer, type PasskeyQuestion } from './passkeys.ts';

type Passkey = typeof passkeys.$inferSelect;
type AssertionPurpose = Exclude<ChallengePurpose, 'register'>;

/** Null where whoever answers is named by the passkey alone. */
type For = { purpose: AssertionPurpose; personId: string | null };

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

export const askAssertion = async (
  site: Site,
  { purpose, personId }: For,
  now: Date,
): Promise<PasskeyQuestion> => {
  const allowed =
    personId === null
      ? []
      : await gateDb(site.gate).select().from(passkeys).where(eq(passkeys.personId, personId));
  const options = await generateAuthenticationOptions({
    rpID: relyingParty(site).id,
    userVerification: 'required',
    allowCredentials: allowed.map(({ credentialId, transports }) => ({ id: credentialId, transports })),
  });
  const { challenge } = options;
  const challengeId = await keepChallenge(site.gate, { purpose, personId, challenge }, now);
  return { challengeId, options: { ...options } };
};

const passkeyNamed = async (gate: Gate, { id, response }: PasskeyAnswer['response']) => {
  if (typeof id !== 'string') return null;
  const rows = await gateDb(gate).select().from(passkeys).where(eq(passkeys.credentialId, id));
  const passkey = rows[0];
  if (!passkey) return null;
  // Where the device says whose passkey it is, it must say the same as we (WebAuthn Level 3, 7.2, step 6).
  const { userHandle } = (response ?? {}) as { userHandle?: unknown };
  const says =
    userHandle === undefined || userHandle === null || userHandle === userHandleOf(passkey.personId);
  return says ? passkey : null;
};

/** The library throws where an answer is not right, where its counter went back, and where it is no answer. */
const counterAfter = async (
  site: Site,
  expectedChallenge: string,
  { credentialId, publicKey, counter }: Passkey,
  response: PasskeyAnswer['response'],
): Promise<number | null> => {
  const { id, origin } = relyingParty(site);
  try {
    const { verified, authenticationInfo } = await verifyAuthenticationResponse({
      response: response as unknown as AuthenticationResponseJSON,
      expectedChallenge,
      expectedOrigin: origin,
      expectedRPID: id,
      credential: {
        id: credentialId,
        publicKey: new Uint8Array(Buffer.from(publicKey, 'base64url')),
        counter,
      },
      requireUserVerification: true,
    });
    return verified ? authenticationInfo.newCounter : null;
  } catch {
    return null;
  }
};

/** Moves the counter on. Passkeys that several devices share do not count and stay at 0. */
const noteUse = async (gate: Gate, { id }: Passkey, counter: number, now: Date): Promise<boolean> => {
  const rows = await gateDb(gate)
    .update(passkeys)
    .set({ counter, lastUsedAt: now })
    .where(
      and(
        eq(passkeys.id, id),
        or(lt(passkeys.counter, counter), and(eq(passkeys.counter, 0), sql`${counter} = 0`)),
      ),
    )
    .returning({ id: passkeys.id });
  return rows.length > 0;
};

/** Whose passkey answered a question of ours; null for any answer that is not right, whatever is wrong with it. */
export const verifyAssertion = async (
  site: Site,
  { purpose, personId }: For,
  { challengeId, response }: PasskeyAnswer,
  now: Date,
): Promise<{ clinicId: string; personId: string } | null> => {
  const challenge = await takeChallenge(site.gate, { id: challengeId, purpose, personId }, now);
  const passkey = await passkeyNamed(site.gate, response);
  if (challenge === null || !passkey) return null;
  if (personId !== null && passkey.personId !== personId) return null;
  const counter = await counterAfter(site, challenge, passkey, response);
  if (counter === null || !(await noteUse(site.gate, passkey, counter, now))) return null;
  return { clinicId: passkey.clinicId, personId: passkey.personId };
};
