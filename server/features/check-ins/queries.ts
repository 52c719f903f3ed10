import { and, asc, desc, eq, lt } from 'drizzle-orm';
import type { EarlierCheckIn } from '#shared/check-ins/usual.ts';
import type { PersonActor } from '../../db/actor.ts';
import { alerts, checkIns } from '../../db/schema/check-ins.ts';
import { flags } from '../../db/schema/flags.ts';
import { patients } from '../../db/schema/patients.ts';
import type { Tx } from '../../db/with-tx.ts';
import { Problem } from '#shared/problems/problems.ts';

export type CheckInRow = typeof checkIns.$inferSelect;
export type AlertRow = typeof alerts.$inferSelect;

export const ownCheckIn = async (
  tx: Tx,
  actor: PersonActor,
  clientId: string,
): Promise<CheckInRow | null> => {
  const rows = await tx
    .select()
    .from(checkIns)
    .where(
      and(
        eq(checkIns.clinicId, actor.clinicId),
        eq(checkIns.authorId, actor.personId),
        eq(checkIns.clientId, clientId),
      ),
    );
  return rows[0] ?? null;
};

export const ownAlert = async (tx: Tx, actor: PersonActor, clientId: string): Promise<AlertRow | null> => {
  const rows = await tx
    .select()
    .from(alerts)
    .where(
      and(
        eq(alerts.clinicId, actor.clinicId),
        eq(alerts.authorId, actor.personId),
        eq(alerts.clientId, clientId),
      ),
    );
  return rows[0] ?? null;
};

/** The one door to an alert: its author while acting for its patient, by the id that the author's device gave it. */
export const alertOf = async (tx: Tx, actor: PersonActor, clientId: string): Promise<AlertRow> => {
  const alert = await ownAlert(tx, actor, clientId);
  if (alert?.patientId !== actor.patientId) throw new Problem('not-found');
  return alert;
};

const historyLimit = 120;

/** The patient's check-ins before an instant, newest first; something new without pain is no baseline. */
export const historyBefore = async (
  tx: Tx,
  clinicId: string,
  patientId: string,
  before: Date,
): Promise<(EarlierCheckIn & { localDate: string })[]> => {
  const rows = await tx
    .select({
      answeredAt: checkIns.answeredAt,
      answers: checkIns.answers,
      localDate: checkIns.localDate,
      authorId: checkIns.authorId,
      patientPersonId: patients.personId,
    })
    .from(checkIns)
    .innerJoin(patients, and(eq(patients.clinicId, checkIns.clinicId), eq(patients.id, checkIns.patientId)))
    .where(
      and(
        eq(checkIns.clinicId, clinicId),
        eq(checkIns.patientId, patientId),
        lt(checkIns.answeredAt, before),
      ),
    )
    .orderBy(desc(checkIns.answeredAt))
    .limit(historyLimit);
  return rows.map(({ answeredAt, answers, localDate, authorId, patientPersonId }) => ({
    answeredAt: answeredAt.toISOString(),
    painNow: answers.painNow ?? null,
    painWorst: answers.painWorst ?? null,
    byProxy: authorId !== patientPersonId,
    localDate,
  }));
};

/** Every date with a daily check-in, and those whose check-in was flagged. */
export const checkInDatesOf = async (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({
      localDate: checkIns.localDate,
      kind: checkIns.kind,
      receivedAt: checkIns.receivedAt,
      flagId: flags.id,
    })
    .from(checkIns)
    .leftJoin(
      flags,
      and(
        eq(flags.clinicId, checkIns.clinicId),
        eq(flags.sourceAuthorId, checkIns.authorId),
        eq(flags.sourceClientId, checkIns.clientId),
      ),
    )
    .where(and(eq(checkIns.clinicId, clinicId), eq(checkIns.patientId, patientId)))
    .orderBy(asc(checkIns.localDate));
