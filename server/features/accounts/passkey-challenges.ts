import { and, eq, gt, lte, sql } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { passkeyChallenges } from '../../db/schema/gate.ts';
import type { Gate } from './one-time-tokens.ts';

export type ChallengePurpose = (typeof passkeyChallenges.$inferSelect)['purpose'];

/** Whom a challenge is for. Null where nobody has said yet who they are. */
type For = { purpose: ChallengePurpose; personId: string | null };

const challengeHoldsMs = 5 * 60_000;

const gateDb = (gate: Gate) => drizzle({ client: gate, casing: 'snake_case' });

/** Keeps a challenge until it is answered, five minutes at most; those that are over go. */
export const keepChallenge = async (
  gate: Gate,
  { purpose, personId, challenge }: For & { challenge: string },
  now: Date,
): Promise<string> => {
  await gateDb(gate).delete(passkeyChallenges).where(lte(passkeyChallenges.expiresAt, now));
  const rows = await gateDb(gate)
    .insert(passkeyChallenges)
    .values({ purpose, personId, challenge, expiresAt: new Date(now.getTime() + challengeHoldsMs) })
    .returning({ id: passkeyChallenges.id });
  const kept = rows[0];
  if (!kept) throw new Error('The challenge was not written.');
  return kept.id;
};

/** Takes a challenge away, before the answer is looked at: of any number of answers one is looked at. */
export const takeChallenge = async (
  gate: Gate,
  { purpose, personId, id }: For & { id: string },
  now: Date,
): Promise<string | null> => {
  const rows = await gateDb(gate)
    .delete(passkeyChallenges)
    .where(
      and(
        eq(passkeyChallenges.id, id),
        eq(passkeyChallenges.purpose, purpose),
        sql`${passkeyChallenges.personId} is not distinct from ${personId}::uuid`,
        gt(passkeyChallenges.expiresAt, now),
      ),
    )
    .returning({ challenge: passkeyChallenges.challenge });
  return rows[0]?.challenge ?? null;
};
