import { and, asc, desc, eq, gte, inArray } from 'drizzle-orm';
import { flagEvents, flags } from '../../db/schema/flags.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { FlagRecord } from './queries.ts';

/**
 * The first clinician who looked at the flag after an alert had been added to it, as recorded. A look before
 * that saw something else.
 */
export const firstSeenEvent = async (
  tx: Tx,
  alert: { clinicId: string; authorId: string; checkInClientId: string; evaluatedAt: Date | null },
): Promise<{ by: string; at: Date } | null> => {
  if (!alert.evaluatedAt) return null;
  const rows = await tx
    .select({ by: people.name, at: flagEvents.at })
    .from(flagEvents)
    .innerJoin(flags, and(eq(flags.clinicId, flagEvents.clinicId), eq(flags.id, flagEvents.flagId)))
    .innerJoin(people, and(eq(people.clinicId, flagEvents.clinicId), eq(people.id, flagEvents.byPersonId)))
    .where(
      and(
        eq(flags.clinicId, alert.clinicId),
        eq(flags.sourceAuthorId, alert.authorId),
        eq(flags.sourceClientId, alert.checkInClientId),
        inArray(flagEvents.kind, ['seen', 'claimed']),
        gte(flagEvents.at, alert.evaluatedAt),
      ),
    )
    .orderBy(asc(flagEvents.at))
    .limit(1);
  return rows[0] ?? null;
};

/** The newest time a flag was raised; a look counts once per person for each. */
export const newestRaisingOf = async (tx: Tx, flag: FlagRecord): Promise<string | null> => {
  const rows = await tx
    .select({ id: flagEvents.id })
    .from(flagEvents)
    .where(
      and(
        eq(flagEvents.clinicId, flag.clinicId),
        eq(flagEvents.flagId, flag.id),
        inArray(flagEvents.kind, ['raised', 'raised-again']),
      ),
    )
    .orderBy(desc(flagEvents.at))
    .limit(1);
  return rows[0]?.id ?? null;
};
