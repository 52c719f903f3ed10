import { and, eq } from 'drizzle-orm';
import { compareUrgency, highestUrgency, type Finding } from '#shared/red-flags/findings.ts';
import type { SystemActor } from '../../db/actor.ts';
import { alerts } from '../../db/schema/check-ins.ts';
import { findings as findingRows, flagEvents, flags } from '../../db/schema/flags.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';
import { announce } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { peopleToTell } from './people-to-tell.ts';
import { firstSeenEvent, patientPersonOf, type FlagRecord } from './queries.ts';

export type FlagSource = {
  patientId: string;
  sourceAuthorId: string;
  sourceClientId: string;
  receivedAt: Date;
};

const sourceIs = (clinicId: string, source: Pick<FlagSource, 'sourceAuthorId' | 'sourceClientId'>) =>
  and(
    eq(flags.clinicId, clinicId),
    eq(flags.sourceAuthorId, source.sourceAuthorId),
    eq(flags.sourceClientId, source.sourceClientId),
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

/** Keeps findings once per rule. Found again, it takes the later values, but never a lower urgency. */
const keepFindings = async (
  tx: Tx,
  flag: FlagRecord,
  found: readonly Finding[],
  now: Date,
): Promise<Finding[]> => {
  const known = await tx
    .select({ code: findingRows.code, urgency: findingRows.urgency })
    .from(findingRows)
    .where(and(eq(findingRows.clinicId, flag.clinicId), eq(findingRows.flagId, flag.id)));
  for (const finding of found) {
    const before = known.find(({ code }) => code === finding.code);
    // What was found at a higher urgency keeps the values that explain it.
    if (before && compareUrgency(before.urgency, finding.urgency) < 0) continue;
    await tx
      .insert(findingRows)
      .values({ clinicId: flag.clinicId, flagId: flag.id, ...finding, foundAt: now })
      .onConflictDoUpdate({
        target: [findingRows.clinicId, findingRows.flagId, findingRows.code],
        set: { urgency: finding.urgency, values: finding.values, ruleVersion: finding.ruleVersion },
      });
  }
  return found.filter(
    ({ code, urgency }) =>
      !known.some((before) => before.code === code && compareUrgency(before.urgency, urgency) <= 0),
  );
};

const tellClinicians = async (
  tx: Tx,
  flag: FlagRecord,
  { urgency, occasion }: { urgency: FlagRecord['urgency']; occasion: string },
  now: Date,
): Promise<void> => {
  const { clinicId, patientId, id } = flag;
  const withOnCall = urgency === 'emergency' || urgency === 'urgent';
  const personIds = await peopleToTell(tx, { clinicId, patientId, withOnCall });
  const kind = urgency === 'emergency' ? 'new-emergency' : 'new-flag';
  await notify(
    tx,
    clinicId,
    personIds,
    { kind, occasion: `flag:${id}:${occasion}`, path: `/round/${id}` },
    now,
  );
};

/**
 * Raises the flag of a check-in, or adds to the one that its alert raised. Exactly one per source: the unique
 * key decides, not a look beforehand. Text and answers may raise its urgency, nothing lowers it. A new finding
 * about a flag that was closed in the meantime opens it again, so that nobody misses it.
 */
export const raiseFlag = async (
  tx: Tx,
  actor: SystemActor,
  source: FlagSource,
  found: readonly Finding[],
  now: Date,
): Promise<void> => {
  const urgency = highestUrgency(found);
  if (!urgency) return;
  const { clinicId } = actor;
  const { receivedAt, ...keys } = source;
  const inserted = await tx
    .insert(flags)
    .values({ clinicId, ...keys, urgency, raisedAt: receivedAt })
    .onConflictDoNothing()
    .returning();
  const made = inserted[0];
  if (made) {
    await keepFindings(tx, made, found, now);
    await addFlagEvent(tx, made, { kind: 'raised', detail: urgency }, now);
    await writeAudit(
      tx,
      actor,
      { action: 'flag.raised', subjectId: made.id, patientId: made.patientId },
      now,
    );
    await tellClinicians(tx, made, { urgency, occasion: urgency }, now);
    await announceFlag(tx, made);
    return;
  }
  const existing = await tx.select().from(flags).where(sourceIs(clinicId, keys)).for('update');
  const flag = existing[0];
  if (!flag) throw new Error('A flag that exists could not be read.');
  const fresh = await keepFindings(tx, flag, found, now);
  const rises = compareUrgency(urgency, flag.urgency) < 0;
  if (fresh.length > 0) {
    const reopened = flag.state === 'closed';
    await tx
      .update(flags)
      .set({
        urgency: rises ? urgency : flag.urgency,
        ...(reopened
          ? {
              state: 'open' as const,
              claimedBy: null,
              claimedAt: null,
              closedAt: null,
              outcome: null,
              worthRaising: null,
            }
          : {}),
      })
      .where(and(eq(flags.clinicId, clinicId), eq(flags.id, flag.id)));
    if (rises || reopened) {
      await addFlagEvent(tx, flag, { kind: 'raised-higher', detail: rises ? urgency : flag.urgency }, now);
    }
    // A new emergency or urgent finding is told again, also where the flag was that high already.
    for (const { code, urgency: high } of fresh) {
      if (high === 'emergency' || high === 'urgent' || reopened) {
        await tellClinicians(tx, flag, { urgency: high, occasion: `${high}:${code}` }, now);
      }
    }
    await writeAudit(
      tx,
      actor,
      { action: 'flag.added-to', subjectId: flag.id, patientId: flag.patientId },
      now,
    );
  }
  await announceFlag(tx, flag);
};

/** Every open morning round of the clinic, and the patient's own Today. */
export const announceFlag = async (tx: Tx, flag: Pick<FlagRecord, 'clinicId' | 'id' | 'patientId'>) => {
  await announce(tx, { clinicians: flag.clinicId }, { topic: 'flags', flagId: flag.id });
  const { personId } = await patientPersonOf(tx, flag.clinicId, flag.patientId);
  await announce(tx, { person: personId }, { topic: 'today' });
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

type AlertSource = { clinicId: string; authorId: string; checkInClientId: string };

/** Puts "ticked by mistake" on the record of the flag, where the alert has raised one already. */
export const noteMistake = async (tx: Tx, alert: AlertSource, now: Date): Promise<void> => {
  const rows = await tx
    .select()
    .from(flags)
    .where(
      sourceIs(alert.clinicId, { sourceAuthorId: alert.authorId, sourceClientId: alert.checkInClientId }),
    );
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
