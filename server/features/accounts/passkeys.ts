import {
  generateRegistrationOptions,
  verifyRegistrationResponse,
  type RegistrationResponseJSON,
} from '@simplewebauthn/server';
import { eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { z } from 'zod';
import type { passkeyAnswer, passkeyQuestion } from '#shared/accounts/fields.ts';
import { Problem } from '#shared/problems/problems.ts';
import { passkeys } from '../../db/schema/gate.ts';
import type { Site } from '../../http/site.ts';
import type { Gate } from './one-time-tokens.ts';
import { keepChallenge, takeChallenge } from './passkey-challenges.ts';

export type PasskeyAnswer = z.output<typeof passkeyAnswer>;
export type PasskeyQuestion = z.output<typeof passkeyQuestion>;

/** What is kept of a passkey that a browser made. */
export type NewPasskey = {
  credentialId: string;
  publicKey: string;
  counter: number;
  transports: string[];
  backedUp: boolean;
};

/** COSE numbers of ES256, RS256 and EdDSA. Said here, so that every web offers and takes the same. */
const algorithms = [-7, -257, -8];

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

/** By what a passkey knows this site: it is bound to the host name, and answers only to the page's own origin. */
export const relyingParty = ({ publicUrl }: Pick<Site, 'publicUrl'>): { id: string; origin: string } => {
  const { hostname, origin } = new URL(publicUrl);
  return { id: hostname, origin };
};

/** What the authenticator keeps as the owner's name: the id of the person, which says nothing of them. */
export const userHandleOf = (personId: string): string => Buffer.from(personId).toString('base64url');

const heldBy = (gate: Gate, personId: string) =>
  gateDb(gate).select().from(passkeys).where(eq(passkeys.personId, personId));

export const askRegistration = async (
  site: Site,
  person: { clinicId: string; personId: string; name: string; email: string },
  now: Date,
): Promise<PasskeyQuestion> => {
  const held = await heldBy(site.gate, person.personId);
  const options = await generateRegistrationOptions({
    rpName: 'Espalier',
    rpID: relyingParty(site).id,
    userName: person.email,
    userDisplayName: person.name,
    userID: new Uint8Array(Buffer.from(person.personId)),
    attestationType: 'none',
    excludeCredentials: held.map(({ credentialId, transports }) => ({ id: credentialId, transports })),
    // Nobody types a name to sign in, and one hand is enough: the device itself knows whose it is and asks them.
    authenticatorSelection: { residentKey: 'required', userVerification: 'required' },
    supportedAlgorithmIDs: algorithms,
  });
  const { challenge } = options;
  const challengeId = await keepChallenge(
    site.gate,
    { purpose: 'register', personId: person.personId, challenge },
    now,
  );
  return { challengeId, options: { ...options } };
};

const inUse = (): Problem =>
  new Problem('state-conflict', 'This passkey is in use already. Make a new one, or sign in with it.');

/** The library throws where an answer is not right, and where it is no answer at all. */
const verified = async (site: Site, expectedChallenge: string, response: PasskeyAnswer['response']) => {
  const { id, origin } = relyingParty(site);
  try {
    const { registrationInfo } = await verifyRegistrationResponse({
      response: response as unknown as RegistrationResponseJSON,
      expectedChallenge,
      expectedOrigin: origin,
      expectedRPID: id,
      requireUserVerification: true,
      supportedAlgorithmIDs: algorithms,
    });
    return registrationInfo ?? null;
  } catch {
    return null;
  }
};

/** The passkey that the browser made for this person's own question; a question is answered once. */
export const verifyRegistration = async (
  site: Site,
  personId: string,
  { challengeId, response }: PasskeyAnswer,
  now: Date,
): Promise<NewPasskey> => {
  const challenge = await takeChallenge(site.gate, { id: challengeId, purpose: 'register', personId }, now);
  const info = challenge === null ? null : await verified(site, challenge, response);
  if (!info) throw new Problem('wrong-code');
  const { credential, credentialBackedUp } = info;
  const known = await gateDb(site.gate)
    .select({ id: passkeys.id })
    .from(passkeys)
    .where(eq(passkeys.credentialId, credential.id));
  if (known.length > 0) throw inUse();
  return {
    credentialId: credential.id,
    publicKey: Buffer.from(credential.publicKey).toString('base64url'),
    counter: credential.counter,
    transports: credential.transports ?? [],
    backedUp: credentialBackedUp,
  };
};

export const keepPasskey = async (
  gate: Gate,
  { clinicId, personId }: { clinicId: string; personId: string },
  passkey: NewPasskey,
  name: string,
  now: Date,
): Promise<void> => {
  const rows = await gateDb(gate)
    .insert(passkeys)
    .values({ ...passkey, clinicId, personId, name, createdAt: now })
    .onConflictDoNothing()
    .returning({ id: passkeys.id });
  if (rows.length === 0) throw inUse();
};
