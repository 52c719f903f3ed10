import { and, asc, eq, ne } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { MyPlan, Today } from '#shared/plans/contract.ts';
import { daysBetween, localDateIn } from '#shared/plans/calendar.ts';
import type { PlanExercise } from '#shared/plans/plan.ts';
import type { Standing } from '#shared/plans/standing.ts';
import { trellisFrom } from '#shared/plans/trellis.ts';
import { pausesExercises } from '#shared/red-flags/evaluate.ts';
import { compareUrgency, type Urgency } from '#shared/red-flags/findings.ts';
import type { PersonActor } from '../../db/actor.ts';
import { flagEvents, flags } from '../../db/schema/flags.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening } from '../audit/service.ts';
import { actedRecord } from '../caregivers/limits.ts';
import { checkInDatesOf } from '../check-ins/queries.ts';
import { countUnseenMessages } from '../threads/queries.ts';
import { chartOf, leadTherapistOf, openFindingsOf, standingOf } from './queries.ts';

const holdOffLines = ({ precautions }: Standing): Today['holdOff'] =>
  precautions.map(({ code, icon, usualWeek, usualDate, due }) => ({ code, icon, usualWeek, usualDate, due }));

const exerciseLines = (exercises: readonly PlanExercise[]): Today['exercises'] =>
  exercises.map(({ code, reps, holdSeconds, sessionsPerDay }) => ({
    code,
    reps,
    holdSeconds,
    sessionsPerDay,
  }));

type OpenFlag = NonNullable<Today['openFlag']> & { urgency: Urgency };

/**
 * The open flag that the patient is told of: one that nobody has read since it was last raised before those that
 * somebody has, then the most urgent, then the newest. So "read" is never said while something is unread.
 */
const openFlagOf = async (tx: Tx, clinicId: string, patientId: string): Promise<Today['openFlag']> => {
  const claimer = alias(people, 'claimer');
  const rows = await tx
    .select({
      id: flags.id,
      urgency: flags.urgency,
      raisedAt: flags.raisedAt,
      claimedBy: claimer.name,
      kind: flagEvents.kind,
      at: flagEvents.at,
      by: people.name,
    })
    .from(flags)
    .innerJoin(flagEvents, and(eq(flagEvents.clinicId, flags.clinicId), eq(flagEvents.flagId, flags.id)))
    .leftJoin(people, and(eq(people.clinicId, flagEvents.clinicId), eq(people.id, flagEvents.byPersonId)))
    .leftJoin(claimer, and(eq(claimer.clinicId, flags.clinicId), eq(claimer.id, flags.claimedBy)))
    .where(and(eq(flags.clinicId, clinicId), eq(flags.patientId, patientId), ne(flags.state, 'closed')))
    .orderBy(asc(flagEvents.at));
  const ids = [...new Set(rows.map(({ id }) => id))];
  const told = ids.flatMap((flagId): OpenFlag[] => {
    const events = rows.filter(({ id }) => id === flagId);
    const [first] = events;
    if (!first) return [];
    const raised = events.findLast(({ kind }) => kind === 'raised' || kind === 'raised-again');
    const look = events.find(
      ({ kind, at }) => (kind === 'seen' || kind === 'claimed') && (!raised || at >= raised.at),
    );
    return [
      {
        urgency: first.urgency,
        raisedAt: first.raisedAt.toISOString(),
        seenBy: look?.by ?? null,
        seenAt: look?.at.toISOString() ?? null,
        claimedBy: first.claimedBy,
      },
    ];
  });
  const [foremost] = told.sort(
    (a, b) =>
      Number(a.seenAt !== null) - Number(b.seenAt !== null) ||
      compareUrgency(a.urgency, b.urgency) ||
      b.raisedAt.localeCompare(a.raisedAt),
  );
  return foremost ?? null;
};

/** Today, on the patient's own screen and on those of their caregivers. */
export const todayFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<Today> => {
  const patientId = actedRecord(actor);
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
  const patientId = actedRecord(actor);
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
