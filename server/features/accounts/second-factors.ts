import { count, eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { z } from 'zod';
import type { giveSecondFactorBody, SignInStep } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { passkeys } from '../../db/schema/gate.ts';
import type { Site } from '../../http/site.ts';
import { acceptAuthenticatorCode, hasAuthenticator } from './authenticators.ts';
import type { Gate } from './one-time-tokens.ts';
import { verifyAssertion } from './passkey-assertions.ts';
import { recoveryCodesLeft, useRecoveryCode } from './recovery-codes.ts';
import { admitTry, forgetTries } from './throttle.ts';

type Answer = z.output<typeof giveSecondFactorBody>['answer'];
type Way = Extract<SignInStep, { next: 'second-factor' }>['ways'][number];

export const passkeyCount = async (gate: Gate, personId: string): Promise<number> => {
  const rows = await drizzle({ client: gate, casing: 'snake_case' })
    .select({ held: count() })
    .from(passkeys)
    .where(eq(passkeys.personId, personId));
  return rows[0]?.held ?? 0;
};

/** How somebody may give a second factor. Recovery codes alone are none: they stand in for one that was lost. */
export const secondFactorWays = async (gate: Gate, personId: string): Promise<Way[]> => {
  const ways: Way[] = [];
  if ((await passkeyCount(gate, personId)) > 0) ways.push('passkey');
  if (await hasAuthenticator(gate, personId)) ways.push('authenticator');
  if (ways.length > 0 && (await recoveryCodesLeft(gate, personId)) > 0) ways.push('recovery-code');
  return ways;
};

const keyOf = (personId: string): string => `second-factor:${personId}`;

/** Counted by person, before the code is looked at: beginning anew gives nobody more guesses. */
export const admitSecondFactorTry = async (site: Site, personId: string, now: Date): Promise<void> => {
  const attempt = await admitTry(site.gate, keyOf(personId), now);
  if (attempt.admitted) return;
  throw new Problem('too-many-attempts', undefined, { retryAfter: attempt.retryAfterSeconds });
};

export const forgetSecondFactorTries = (site: Site, personId: string): Promise<void> =>
  forgetTries(site.gate, keyOf(personId));

const isRight = async (
  site: Site,
  { purpose, personId }: { purpose: 'second-factor' | 'prove'; personId: string },
  answer: Answer,
  now: Date,
): Promise<boolean> => {
  if (answer.way === 'authenticator') return acceptAuthenticatorCode(site, personId, answer.code, now);
  if (answer.way === 'recovery-code') return useRecoveryCode(site, personId, answer.code, now);
  return (await verifyAssertion(site, { purpose, personId }, answer.passkey, now)) !== null;
};

/** Takes a code or a passkey of this person, or refuses it; what is wrong with it is not said. */
export const requireSecondFactor = async (
  site: Site,
  person: { purpose: 'second-factor' | 'prove'; personId: string },
  answer: Answer,
  now: Date,
): Promise<void> => {
  await admitSecondFactorTry(site, person.personId, now);
  if (!(await isRight(site, person, answer, now))) throw new Problem('wrong-code');
  await forgetSecondFactorTries(site, person.personId);
};
