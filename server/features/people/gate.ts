import { and, eq, inArray, isNotNull, max } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import { Problem } from '#shared/problems/problems.ts';
import {
  authenticators,
  credentials,
  oneTimeTokens,
  passkeys,
  recoveryCodes,
  signedInSessions,
} from '../../db/schema/gate.ts';
import type { Gate } from '../accounts/one-time-tokens.ts';

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

/** Which of these tokens were used up. */
export const usedTokensAmong = async (gate: Gate, ids: readonly string[]): Promise<Set<string>> => {
  if (ids.length === 0) return new Set();
  const rows = await gateDb(gate)
    .select({ id: oneTimeTokens.id })
    .from(oneTimeTokens)
    .where(and(inArray(oneTimeTokens.id, [...ids]), isNotNull(oneTimeTokens.usedAt)));
  return new Set(rows.map(({ id }) => id));
};

/** Whether somebody can sign in already, with a password or a passkey. */
export const hasWayIn = async (gate: Gate, personId: string): Promise<boolean> =>
  (await gateDb(gate).$count(credentials, eq(credentials.personId, personId))) > 0;

/** What the list of staff shows of the gate: who has a second factor, and when each was last there. */
export const signInFactsOf = async (gate: Gate, personIds: readonly string[]) => {
  const ids = [...personIds];
  if (ids.length === 0) return { withSecondFactor: new Set<string>(), lastActivity: new Map<string, Date>() };
  const db = gateDb(gate);
  const withApp = await db
    .select({ personId: authenticators.personId })
    .from(authenticators)
    .where(and(inArray(authenticators.personId, ids), isNotNull(authenticators.confirmedAt)));
  const withPasskey = await db
    .select({ personId: passkeys.personId })
    .from(passkeys)
    .where(inArray(passkeys.personId, ids));
  const activity = await db
    .select({ personId: signedInSessions.personId, at: max(signedInSessions.lastActivityAt) })
    .from(signedInSessions)
    .where(inArray(signedInSessions.personId, ids))
    .groupBy(signedInSessions.personId);
  return {
    withSecondFactor: new Set([...withApp, ...withPasskey].map(({ personId }) => personId)),
    lastActivity: new Map(activity.flatMap(({ personId, at }) => (at ? [[personId, at] as const] : []))),
  };
};

/** Authenticator, recovery codes and passkeys of somebody are gone; a password stays. */
export const removeSecondFactors = async (gate: Gate, personId: string): Promise<void> => {
  const db = gateDb(gate);
  await db.delete(passkeys).where(eq(passkeys.personId, personId));
  await db.delete(recoveryCodes).where(eq(recoveryCodes.personId, personId));
  await db.delete(authenticators).where(eq(authenticators.personId, personId));
};

const uniqueViolation = '23505';

/** The account of somebody; an address opens one account of all clinics together. */
export const keepCredentials = async (
  gate: Gate,
  { clinicId, personId, email }: { clinicId: string; personId: string; email: string },
): Promise<void> => {
  try {
    const { rowCount } = await gate.query(
      `insert into credentials (person_id, clinic_id, email) values ($1, $2, $3)
       on conflict (person_id) do update set email = excluded.email
       where credentials.clinic_id = excluded.clinic_id`,
      [personId, clinicId, email],
    );
    if (rowCount !== 1) throw new Error('A person of two clinics.');
  } catch (error) {
    if (!(error instanceof pg.DatabaseError) || error.code !== uniqueViolation) throw error;
    throw new Problem(
      'state-conflict',
      'Somebody signs in with this e-mail address already. Ask the clinic to invite you with another one.',
    );
  }
};
