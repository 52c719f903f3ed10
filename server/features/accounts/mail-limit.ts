import { and, asc, eq, gt } from 'drizzle-orm';
import { drizzle } from 'drizzle-orm/node-postgres';
import { oneTimeTokens } from '../../db/schema/gate.ts';
import type { Gate } from './one-time-tokens.ts';

const mailsAnHour = 3;
const hourMs = 60 * 60_000;

/**
 * Seconds until one more link of a kind may be mailed to a person; null where it may be now. Three an hour are
 * enough for anybody, and no more fill a mailbox. Counted inside the lock on the person's ways in.
 */
export const secondsUntilNextMail = async (
  gate: Gate,
  personId: string,
  kind: 'password-reset' | 'email-change',
  now: Date,
): Promise<number | null> => {
  const since = new Date(now.getTime() - hourMs);
  const rows = await drizzle({ client: gate, casing: 'snake_case' })
    .select({ createdAt: oneTimeTokens.createdAt })
    .from(oneTimeTokens)
    .where(
      and(
        eq(oneTimeTokens.personId, personId),
        eq(oneTimeTokens.kind, kind),
        gt(oneTimeTokens.createdAt, since),
      ),
    )
    .orderBy(asc(oneTimeTokens.createdAt));
  const first = rows[rows.length - mailsAnHour];
  return first ? Math.ceil((first.createdAt.getTime() - since.getTime()) / 1000) : null;
};
