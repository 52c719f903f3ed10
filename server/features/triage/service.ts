import { and, eq } from 'drizzle-orm';
import { alerts } from '../../db/schema/check-ins.ts';
import { flagEvents, flags } from '../../db/schema/flags.ts';
import type { Tx } from '../../db/with-tx.ts';
import { announce } from '../../realtime/announce.ts';
import { firstSeenEvent } from './looks.ts';
import type { FlagRecord } from './queries.ts';

const sourceIs = (clinicId: string, source: { authorId: string; checkInClientId: string }) =>
  and(
    eq(flags.clinicId, clinicId),
    eq(flags.sourceAuthorId, source.authorId),
    eq(flags.sourceClientId, source.checkInClientId),
  );

export const addFlagEvent = async (
  tx: Tx,
  flag: Pick<FlagRecord, 'clinicId' | 'id'>,
  event: Pick<typeof flagEvents.$inferInsert, 'kind' | 'byPersonId' | 'detail' | 'note'>,
  now: Date,
): Promise<boolean> => {
  const rows = await tx
    .insert(flagEvents)
    .values({ clinicId: flag.clinicId, flagId: flag.id, at: now, ...event })
    .onConflictDoNothing()
    .returning({ id: flagEvents.id });
  return rows.length > 0;
};

/** Every open morning round of the clinic, and Today of the patient and of those who care for them. */
export const announceFlag = async (tx: Tx, flag: Pick<FlagRecord, 'clinicId' | 'id' | 'patientId'>) => {
  await announce(tx, { clinicians: flag.clinicId }, { topic: 'flags', flagId: flag.id });
  await announce(tx, { patient: flag.patientId }, { topic: 'today' });
};

/** Tells the patient's phone that something became of the alerts behind a flag. */
export const announceAlerts = async (tx: Tx, flag: FlagRecord): Promise<void> => {
  const rows = await tx
    .select({ clientId: alerts.clientId, authorId: alerts.authorId })
    .from(alerts)
    .where(
      and(
        eq(alerts.clinicId, flag.clinicId),
        eq(alerts.authorId, flag.sourceAuthorId),
        eq(alerts.checkInClientId, flag.sourceClientId),
      ),
    );
  for (const { clientId, authorId } of rows) {
    await announce(tx, { person: authorId }, { topic: 'alert', alertId: clientId });
  }
};

type AlertSource = { clinicId: string; authorId: string; checkInClientId: string; evaluatedAt: Date | null };

/** Puts "ticked by mistake" on the record of the flag, where the alert has raised one already. */
export const noteMistake = async (tx: Tx, alert: AlertSource, now: Date): Promise<void> => {
  const rows = await tx.select().from(flags).where(sourceIs(alert.clinicId, alert));
  const flag = rows[0];
  if (!flag) return;
  await addFlagEvent(tx, flag, { kind: 'ticked-by-mistake', byPersonId: alert.authorId }, now);
  await announceFlag(tx, flag);
};

/** Who was the first to have it on the screen; what is not recorded is not told. */
export const firstSeenOf = async (tx: Tx, alert: AlertSource): Promise<{ by: string; at: string } | null> => {
  const seen = await firstSeenEvent(tx, alert);
  return seen && { by: seen.by, at: seen.at.toISOString() };
};
