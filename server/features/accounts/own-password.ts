import { eq } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { credentials } from '../../db/schema/gate.ts';
import type { GuardedContext } from '../../http/route.ts';
import { revokeSessionsOf } from '../../http/sessions.ts';
import { writeAudit } from '../audit/service.ts';
import { tellSignInChanged } from './notices.ts';
import { revokeTokens, type Gate } from './one-time-tokens.ts';
import { refuseCommonPassword } from './password-policy.ts';
import { hashPassword } from './passwords.ts';
import { dropPendingSignIns } from './pending-sign-ins.ts';
import { personOf } from './queries.ts';
import { settleEndedSession } from './session-list.ts';
import { credentialsOf, waysInOf } from './ways-in.ts';
import { withWaysInLocked } from './ways-in-lock.ts';

/** Writes a new password, with which whatever the old one had begun comes to nothing. Inside the lock. */
export const writePassword = async (
  gate: Gate,
  personId: string,
  passwordHash: string,
  now: Date,
): Promise<void> => {
  await drizzle({ client: gate, casing: 'snake_case' })
    .update(credentials)
    .set({ passwordHash })
    .where(eq(credentials.personId, personId));
  await dropPendingSignIns(gate, personId);
  await revokeTokens(gate, personId, 'password-reset', now);
  // Whoever knew the old password may have asked for an address of their own, and that would outlast the new one.
  await revokeTokens(gate, personId, 'email-change', now);
};

export const changeOwnPassword = async (
  { tx, actor, browser, site, now }: GuardedContext,
  password: string,
): Promise<WaysIn> => {
  const { personId } = actor;
  const { name } = await personOf(tx, actor);
  const { email } = await credentialsOf(site.gate, personId);
  refuseCommonPassword(password, { name, email });
  const passwordHash = await hashPassword(password);
  await writeAudit(tx, actor, { action: 'password.changed', subjectId: personId }, now);
  await tellSignInChanged(tx, actor, 'password', now);
  await withWaysInLocked(site.gate, personId, (gate) => writePassword(gate, personId, passwordHash, now));
  const kept = browser.signedIn?.sessionId ?? null;
  for (const ended of await revokeSessionsOf(site.gate, personId, now, kept)) {
    await settleEndedSession(tx, actor.clinicId, ended);
  }
  return waysInOf(site.gate, personId, now);
};
