import { and, eq, gt, sql } from 'drizzle-orm';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { careTeamMembers, chartOpenings, patients } from '../../db/schema/patients.ts';
import type { Tx } from '../../db/with-tx.ts';
import { writeAudit } from '../audit/service.ts';

export type PatientRow = typeof patients.$inferSelect;

/** A reason that was given opens the chart for this long. */
export const reasonHoldsMs = 12 * 60 * 60_000;

/** A patient of the clinic, whoever asks. The caller knows why that is enough. */
export const patientOfClinic = async (tx: Tx, clinicId: string, patientId: string): Promise<PatientRow> => {
  const rows = await tx
    .select()
    .from(patients)
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  const row = rows[0];
  if (!row) throw new Problem('not-found');
  return row;
};

/**
 * The one door to a patient's chart: the care team, and any other clinician of the clinic for twelve hours after
 * they said why. Routes let clinicians only as far as this.
 */
export const chartVisibleTo = async (
  tx: Tx,
  actor: PersonActor,
  patientId: string,
  now: Date,
): Promise<PatientRow> => {
  const patient = await patientOfClinic(tx, actor.clinicId, patientId);
  const onTeam = await tx.$count(
    careTeamMembers,
    and(
      eq(careTeamMembers.clinicId, actor.clinicId),
      eq(careTeamMembers.patientId, patientId),
      eq(careTeamMembers.personId, actor.personId),
    ),
  );
  if (onTeam > 0) return patient;
  const reasons = await tx.$count(
    chartOpenings,
    and(
      eq(chartOpenings.clinicId, actor.clinicId),
      eq(chartOpenings.patientId, patientId),
      eq(chartOpenings.personId, actor.personId),
      gt(chartOpenings.at, new Date(now.getTime() - reasonHoldsMs)),
    ),
  );
  if (reasons === 0) throw new Problem('reason-needed');
  return patient;
};

/** Keeps why a chart is opened. The words stay where the patient reads them; the audit names their row. */
export const giveReason = async (
  tx: Tx,
  actor: PersonActor,
  { patientId, reason }: { patientId: string; reason: string },
  now: Date,
): Promise<void> => {
  await patientOfClinic(tx, actor.clinicId, patientId);
  const rows = await tx
    .insert(chartOpenings)
    .values({ clinicId: actor.clinicId, patientId, personId: actor.personId, reason, at: now })
    .returning({ id: chartOpenings.id });
  const subjectId = rows[0]?.id;
  if (!subjectId) throw new Error('A reason that was just written is not there.');
  await writeAudit(tx, actor, { action: 'chart.opened-outside-team', subjectId, patientId }, now);
};

/** On the care team, for a query over patients. */
export const isMine = (actor: PersonActor) => sql<boolean>`exists (
  select 1 from care_team_members mine
  where mine.clinic_id = ${patients.clinicId} and mine.patient_id = ${patients.id}
    and mine.person_id = ${actor.personId})`;
