import { and, asc, desc, eq, gt, isNull } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { isStaff } from '#shared/access/permissions.ts';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { credentials, oneTimeTokens, passkeys } from '../../db/schema/gate.ts';
import type { GuardedContext } from '../../http/route.ts';
import { hasAuthenticator } from './authenticators.ts';
import type { Gate } from './one-time-tokens.ts';
import { recoveryCodesLeft } from './recovery-codes.ts';
import { secondFactorWays } from './second-factors.ts';

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

export const credentialsOf = async (gate: Gate, personId: string) => {
  const rows = await gateDb(gate).select().from(credentials).where(eq(credentials.personId, personId));
  const found = rows[0];
  if (!found) throw new Error('Somebody is signed in and has no way in.');
  return found;
};

const pendingEmailOf = async (gate: Gate, personId: string, now: Date): Promise<string | null> => {
  const rows = await gateDb(gate)
    .select({ email: oneTimeTokens.email })
    .from(oneTimeTokens)
    .where(
      and(
        eq(oneTimeTokens.personId, personId),
        eq(oneTimeTokens.kind, 'email-change'),
        isNull(oneTimeTokens.usedAt),
        isNull(oneTimeTokens.revokedAt),
        gt(oneTimeTokens.expiresAt, now),
      ),
    )
    .orderBy(desc(oneTimeTokens.createdAt))
    .limit(1);
  return rows[0]?.email ?? null;
};

/** One's own ways in, as far as they are there. */
export const waysInOf = async (gate: Gate, personId: string, now: Date): Promise<WaysIn> => {
  const { email, passwordHash } = await credentialsOf(gate, personId);
  const held = await gateDb(gate)
    .select()
    .from(passkeys)
    .where(eq(passkeys.personId, personId))
    .orderBy(asc(passkeys.createdAt), asc(passkeys.id));
  return {
    email,
    hasPassword: passwordHash !== null,
    passkeys: held.map(({ id, name, createdAt, lastUsedAt }) => ({
      id,
      name,
      createdAt: createdAt.toISOString(),
      lastUsedAt: lastUsedAt?.toISOString() ?? null,
    })),
    authenticator: await hasAuthenticator(gate, personId),
    recoveryCodesLeft: await recoveryCodesLeft(gate, personId),
    pendingEmail: await pendingEmailOf(gate, personId, now),
  };
};

/**
 * Staff may set up their first second factor with the password alone. Once they have one, a session that was
 * opened without it adds no further one: whoever knows only the password would let themselves in for good.
 */
export const refuseSecondSetUp = async ({ actor, browser, site }: GuardedContext): Promise<void> => {
  if (!isStaff(actor.roles) || browser.signedIn?.secondFactor) return;
  if ((await secondFactorWays(site.gate, actor.personId)).length === 0) return;
  throw new Problem('second-factor-needed', 'You have a second factor already. Sign in again with it.');
};

/** Staff who set up a second factor have given it: they go on without signing in again. */
export const countAsGiven = async (
  { browser }: GuardedContext,
  secondFactor: 'passkey' | 'authenticator',
): Promise<void> => {
  if (!(await browser.prove(secondFactor))) throw new Problem('not-signed-in');
};
