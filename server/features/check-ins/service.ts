import { isDeepStrictEqual } from 'node:util';
import { and, eq } from 'drizzle-orm';
import type { AlertReceipt, CheckInReceipt, PostAlert, PostCheckIn } from '#shared/check-ins/contract.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { alertMistakes, alerts, checkIns } from '../../db/schema/check-ins.ts';
import { operationCards, patients } from '../../db/schema/patients.ts';
import type { Tx } from '../../db/with-tx.ts';
import { enqueue } from '../../jobs/enqueue.ts';
import { announce } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { checkInRecord } from '../caregivers/limits.ts';
import { firstSeenOf, noteMistake } from '../triage/service.ts';
import { alertOf, ownAlert, ownCheckIn, type AlertRow, type CheckInRow } from './queries.ts';

const clockToleranceMs = 5 * 60_000;
const dayMs = 24 * 60 * 60_000;
/** Nothing that waits on a device waits longer; an older answer is a clock that was set back. */
const oldestAnswerMs = 7 * dayMs;

/**
 * When the answers were given, and which local date they are for. A device's clock never refuses a check-in:
 * where it disagrees with the server's by more than five minutes, or names a time that cannot be, the row is
 * marked, the server's date is taken, and the time is corrected by the disagreement. What the device said is kept.
 */
const datedAnswers = async (
  tx: Tx,
  actor: PersonActor,
  patientId: string,
  { answeredAt, sentAt }: { answeredAt: string; sentAt: string },
  now: Date,
) => {
  const rows = await tx
    .select({ timeZone: patients.timeZone, surgeryDate: operationCards.surgeryDate })
    .from(patients)
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .where(and(eq(patients.clinicId, actor.clinicId), eq(patients.id, patientId)));
  const patient = rows[0];
  if (!patient) throw new Error('A patient without a record.');
  const nowMs = now.getTime();
  const behindMs = nowMs - Date.parse(sentAt);
  const canBe = (ms: number) =>
    ms <= nowMs + clockToleranceMs &&
    ms >= nowMs - oldestAnswerMs &&
    localDateIn(patient.timeZone, new Date(ms)) >= patient.surgeryDate;
  const answeredMs = Date.parse(answeredAt);
  if (Math.abs(behindMs) <= clockToleranceMs && canBe(answeredMs)) {
    const answered = new Date(answeredMs);
    return {
      answeredAt: answered,
      answeredAtDevice: null,
      clockDoubtful: false,
      localDate: localDateIn(patient.timeZone, answered),
    };
  }
  const correctedMs = Math.min(nowMs, answeredMs + behindMs);
  return {
    answeredAt: canBe(correctedMs) ? new Date(correctedMs) : now,
    answeredAtDevice: answeredAt,
    clockDoubtful: true,
    localDate: localDateIn(patient.timeZone, now),
  };
};

const receiptOf = (row: CheckInRow): CheckInReceipt => ({
  id: row.clientId,
  receivedAt: row.receivedAt.toISOString(),
  localDate: row.localDate,
  clockDoubtful: row.clockDoubtful,
});

/** Keeps a check-in and the job that evaluates it, together or not at all. A repeat is the same check-in. */
export const submitCheckIn = async (
  tx: Tx,
  actor: PersonActor,
  input: PostCheckIn,
  now: Date,
): Promise<CheckInReceipt> => {
  const patientId = await checkInRecord(tx, actor);
  const rows = await tx
    .insert(checkIns)
    .values({
      clinicId: actor.clinicId,
      patientId,
      authorId: actor.personId,
      clientId: input.id,
      kind: input.kind,
      answers: input.answers,
      rulesVersion: input.rulesVersion,
      receivedAt: now,
      ...(await datedAnswers(tx, actor, patientId, input, now)),
    })
    .onConflictDoNothing()
    .returning();
  const written = rows[0];
  if (!written) {
    const earlier = await ownCheckIn(tx, actor, input.id);
    if (!earlier) throw new Problem('state-conflict');
    const isSame =
      earlier.patientId === patientId &&
      earlier.kind === input.kind &&
      isDeepStrictEqual(earlier.answers, input.answers);
    if (!isSame) throw new Problem('id-conflict');
    return receiptOf(earlier);
  }
  await enqueue(
    tx,
    'evaluate-check-in',
    { clinicId: actor.clinicId, checkInId: written.id },
    { key: written.id },
  );
  await writeAudit(tx, actor, { action: 'check-in.sent', subjectId: written.id, patientId }, now);
  await announce(tx, { patient: patientId }, { topic: 'today' });
  return receiptOf(written);
};

const alertReceiptOf = async (tx: Tx, alert: AlertRow): Promise<AlertReceipt> => ({
  id: alert.clientId,
  checkInId: alert.checkInClientId,
  receivedAt: alert.receivedAt.toISOString(),
  seen: await firstSeenOf(tx, alert),
});

/** Keeps an emergency or urgent answer at the tick, with the job that evaluates it. */
export const submitAlert = async (
  tx: Tx,
  actor: PersonActor,
  input: PostAlert,
  now: Date,
): Promise<AlertReceipt> => {
  const patientId = await checkInRecord(tx, actor);
  const rows = await tx
    .insert(alerts)
    .values({
      clinicId: actor.clinicId,
      patientId,
      authorId: actor.personId,
      clientId: input.id,
      checkInClientId: input.checkInId,
      answers: input.answers,
      rulesVersion: input.rulesVersion,
      receivedAt: now,
      ...(await datedAnswers(tx, actor, patientId, input, now)),
    })
    .onConflictDoNothing()
    .returning();
  const written = rows[0];
  if (!written) {
    const earlier = await ownAlert(tx, actor, input.id);
    if (!earlier) throw new Problem('state-conflict');
    const isSame =
      earlier.patientId === patientId &&
      earlier.checkInClientId === input.checkInId &&
      isDeepStrictEqual(earlier.answers, input.answers);
    if (!isSame) throw new Problem('id-conflict');
    return alertReceiptOf(tx, earlier);
  }
  await enqueue(tx, 'evaluate-alert', { clinicId: actor.clinicId, alertId: written.id }, { key: written.id });
  await writeAudit(tx, actor, { action: 'alert.sent', subjectId: written.id, patientId }, now);
  return alertReceiptOf(tx, written);
};

export const readAlert = async (tx: Tx, actor: PersonActor, alertId: string): Promise<AlertReceipt> =>
  alertReceiptOf(tx, await alertOf(tx, actor, alertId));

/** "I ticked this by mistake": kept as a record of its own. The flag stays, for a human to close. */
export const submitMistake = async (
  tx: Tx,
  actor: PersonActor,
  input: { alertId: string; id: string; answeredAt: string },
  now: Date,
): Promise<{ id: string; receivedAt: string }> => {
  await checkInRecord(tx, actor);
  const alert = await alertOf(tx, actor, input.alertId);
  const author = { clinicId: actor.clinicId, authorId: actor.personId, clientId: input.id };
  const rows = await tx
    .insert(alertMistakes)
    .values({ ...author, alertId: alert.id, answeredAtDevice: input.answeredAt, receivedAt: now })
    .onConflictDoNothing()
    .returning();
  const written = rows[0];
  if (written) {
    await noteMistake(tx, alert, now);
    await writeAudit(
      tx,
      actor,
      { action: 'alert.called-a-mistake', subjectId: alert.id, patientId: alert.patientId },
      now,
    );
    return { id: input.id, receivedAt: now.toISOString() };
  }
  const earlier = await tx
    .select()
    .from(alertMistakes)
    .where(
      and(
        eq(alertMistakes.clinicId, author.clinicId),
        eq(alertMistakes.authorId, author.authorId),
        eq(alertMistakes.clientId, author.clientId),
      ),
    );
  const same = earlier[0];
  if (!same || same.alertId !== alert.id) throw new Problem('id-conflict');
  return { id: input.id, receivedAt: same.receivedAt.toISOString() };
};
