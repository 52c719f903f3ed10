import { and, eq } from 'drizzle-orm';
import { flags } from '../../db/schema/flags.ts';
import type { Tx } from '../../db/with-tx.ts';
import { addFlagEvent, announceFlag } from './service.ts';

/**
 * Opens again what somebody has claimed who can no longer work on it. A claim is released or closed by its holder
 * alone, so what they leave behind would be nobody's, and still look as if somebody saw to it.
 */
export const releaseClaimsOf = async (
  tx: Tx,
  holder: { clinicId: string; personId: string },
  byPersonId: string,
  now: Date,
): Promise<void> => {
  const { clinicId, personId } = holder;
  const released = await tx
    .update(flags)
    .set({ state: 'open', claimedBy: null, claimedAt: null })
    .where(and(eq(flags.clinicId, clinicId), eq(flags.state, 'claimed'), eq(flags.claimedBy, personId)))
    .returning();
  for (const flag of released) {
    await addFlagEvent(tx, flag, { kind: 'released', byPersonId }, now);
    await announceFlag(tx, flag);
  }
};
