import { and, desc, eq, inArray, ne } from 'drizzle-orm';
import type { MyPlan, Today } from '#shared/plans/contract.ts';
import { daysBetween, localDateIn } from '#shared/plans/calendar.ts';
import type { PlanExercise } from '#shared/plans/plan.ts';
import type { Standing } from '#shared/plans/standing.ts';
import { trellisFrom } from '#shared/plans/trellis.ts';
import { Problem } from '#shared/problems/problems.ts';
import { pausesExercises } from '#shared/red-flags/evaluate.ts';
import type { PersonActor } from '../../db/actor.ts';
import { flagEvents, flags } from '../../db/schema/flags.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening } from '../audit/service.ts';
import { checkInDatesOf } from '../check-ins/queries.ts';
import { countUnseenMessages } from '../threads/queries.ts';
import { chartOf, leadTherapistOf, openFindingsOf, standingOf } from './queries.ts';

const ownPatientId = (actor: PersonActor): string => {
  if (!actor.patientId) throw new Problem('forbidden');
  return actor.patientId;
};

const holdOffLines = ({ precautions }: Standing): Today['holdOff'] =>
  precautions.map(({ code, icon, usualWeek, usualDate, due }) => ({ code, icon, usualWeek, usualDate, due }));

const exerciseLines = (exercises: readonly PlanExercise[]): Today['exercises'] =>
  exercises.map(({ code, reps, holdSeconds, sessionsPerDay }) => ({
    code,
    reps,
    holdSeconds,
    sessionsPerDay,
  }));

/** The newest flag that no clinician has closed, as far as its patient is told: who has read it, and when. */
const openFlagOf = async (tx: Tx, clinicId: string, patientId: string): Promise<Today['openFlag']> => {
  const rows = await tx
    .select({ id: flags.id, raisedAt: flags.raisedAt, claimedBy: people.name })
    .from(flags)
    .leftJoin(people, and(eq(people.clinicId, flags.clinicId), eq(people.id, flags.claimedBy)))
    .where(and(eq(flags.clinicId, clinicId), eq(flags.patientId, patientId), ne(flags.state, 'closed')))
    .orderBy(desc(flags.raisedAt))
    .limit(1);
  const flag = rows[0];
  if (!flag) return null;
  const seen = await tx
    .select({ by: people.name, at: flagEvents.at })
    .from(flagEvents)
    .innerJoin(people, and(eq(people.clinicId, flagEvents.clinicId), eq(people.id, flagEvents.byPersonId)))
    .where(
      and(
        eq(flagEvents.clinicId, clinicId),
        eq(flagEvents.flagId, flag.id),
        inArray(flagEvents.kind, ['seen', 'claimed']),
      ),
    )
    .orderBy(flagEvents.at)
    .limit(1);
  return {
    raisedAt: flag.raisedAt.toISOString(),
    seenBy: seen[0]?.by ?? null,
    seenAt: seen[0]?.at.toISOString() ?? null,
    claimedBy: flag.claimedBy,
  };
};

/** The patient's own Today. */
export const todayFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<Today> => {
  const patientId = ownPatientId(actor);
  const chart = await chartOf(tx, actor.clinicId, patientId);
  const date = localDateIn(chart.patient.timeZone, now);
  const standing = standingOf(chart, now, date);
  const sent = await checkInDatesOf(tx, actor.clinicId, patientId);
  const daily = sent.filter(({ kind }) => kind === 'daily');
  const { surgeryDate, arm, surgeon } = chart.card;
  const past = new Set(daily.map(({ localDate }) => localDate).filter((on) => on < date && on > surgeryDate));
  await auditOpening(tx, actor, { action: 'today.read', subjectId: patientId, patientId }, now);
  return {
    firstName: chart.name.split(' ')[0] ?? chart.name,
    date,
    day: standing.day,
    arm,
    therapist: await leadTherapistOf(tx, actor.clinicId, patientId),
    surgeon,
    surgeryDate,
    phase: {
      code: standing.phase?.code ?? chart.plan.phases[0]?.code ?? '',
      usualEndDate: standing.phase?.usualEndDate ?? null,
    },
    trellis: trellisFrom({
      arm,
      surgeryDate,
      standing,
      checkInDays: sent.map(({ localDate, flagId }) => ({ date: localDate, flagged: flagId !== null })),
    }),
    checkIns: {
      done: past.size,
      of: Math.max(0, daysBetween(surgeryDate, date) - 1),
      todayAt: daily.findLast(({ localDate }) => localDate === date)?.receivedAt.toISOString() ?? null,
    },
    holdOff: holdOffLines(standing),
    exercises: exerciseLines(standing.exercises),
    paused: pausesExercises(await openFindingsOf(tx, actor.clinicId, patientId)),
    openFlag: await openFlagOf(tx, actor.clinicId, patientId),
    unseenMessages: await countUnseenMessages(tx, actor),
  };
};

/** The whole recovery plan by phase. */
export const myPlanFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<MyPlan> => {
  const patientId = ownPatientId(actor);
  const chart = await chartOf(tx, actor.clinicId, patientId);
  const standing = standingOf(chart, now);
  await auditOpening(tx, actor, { action: 'plan.read', subjectId: patientId, patientId }, now);
  return {
    procedure: chart.card.procedure,
    arm: chart.card.arm,
    surgeryDate: chart.card.surgeryDate,
    therapist: await leadTherapistOf(tx, actor.clinicId, patientId),
    surgeon: chart.card.surgeon,
    phases: standing.phases.map(
      ({ code, openedOn, current, usualStartWeek, usualEndWeek, usualEndDate }) => ({
        code,
        openedOn,
        current,
        usualStartWeek,
        usualEndWeek,
        usualEndDate,
      }),
    ),
    holdOff: holdOffLines(standing),
    exercises: exerciseLines(standing.exercises),
    changes: chart.signOffs,
  };
};
