import { and, asc, desc, eq, ne } from 'drizzle-orm';
import { standingOn, type Standing } from '#shared/plans/standing.ts';
import { localDateIn } from '#shared/plans/calendar.ts';
import type { PlanContent, SignOff } from '#shared/plans/plan.ts';
import { findings, flags } from '../../db/schema/flags.ts';
import { careTeamMembers, operationCards, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import { plans, signOffs } from '../../db/schema/plans.ts';
import type { Tx } from '../../db/with-tx.ts';

export type Chart = {
  patient: typeof patients.$inferSelect;
  name: string;
  card: typeof operationCards.$inferSelect;
  plan: PlanContent;
  signOffs: (SignOff & { by: string })[];
};

/** A patient's record, operation card and plan. The caller's door has decided that it may be read. */
export const chartOf = async (tx: Tx, clinicId: string, patientId: string): Promise<Chart> => {
  const rows = await tx
    .select({
      patient: patients,
      name: people.name,
      card: operationCards,
      planId: plans.id,
      plan: plans.content,
    })
    .from(patients)
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    )
    .innerJoin(plans, and(eq(plans.clinicId, patients.clinicId), eq(plans.patientId, patients.id)))
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  const row = rows[0];
  if (!row) throw new Error('A patient without operation card or plan.');
  const { planId, ...chart } = row;
  const signed = await tx
    .select({ kind: signOffs.kind, code: signOffs.code, on: signOffs.onDate, by: people.name })
    .from(signOffs)
    .innerJoin(people, and(eq(people.clinicId, signOffs.clinicId), eq(people.id, signOffs.byPersonId)))
    .where(and(eq(signOffs.clinicId, clinicId), eq(signOffs.planId, planId)))
    .orderBy(desc(signOffs.onDate), asc(signOffs.code));
  return { ...chart, signOffs: signed };
};

/** Where the patient stands on a date; today in their own zone by default. */
export const standingOf = (
  chart: Chart,
  now: Date,
  date = localDateIn(chart.patient.timeZone, now),
): Standing =>
  standingOn({
    plan: chart.plan,
    surgeryDate: chart.card.surgeryDate,
    date,
    signOffs: chart.signOffs,
  });

/** The therapist whose name the patient sees. */
export const leadTherapistOf = async (
  tx: Tx,
  clinicId: string,
  patientId: string,
): Promise<string | null> => {
  const rows = await tx
    .select({ name: people.name })
    .from(careTeamMembers)
    .innerJoin(
      people,
      and(eq(people.clinicId, careTeamMembers.clinicId), eq(people.id, careTeamMembers.personId)),
    )
    .where(
      and(
        eq(careTeamMembers.clinicId, clinicId),
        eq(careTeamMembers.patientId, patientId),
        eq(careTeamMembers.isLead, true),
      ),
    );
  return rows[0]?.name ?? null;
};

/** The findings of flags that no clinician has closed: they decide whether exercises are paused. */
export const openFindingsOf = (tx: Tx, clinicId: string, patientId: string) =>
  tx
    .select({ code: findings.code })
    .from(findings)
    .innerJoin(flags, and(eq(flags.clinicId, findings.clinicId), eq(flags.id, findings.flagId)))
    .where(and(eq(flags.clinicId, clinicId), eq(flags.patientId, patientId), ne(flags.state, 'closed')));
