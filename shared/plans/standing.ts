import { addDays, dateOfWeek, dayPostOp, daysBetween, weekPostOp, type LocalDate } from './calendar.ts';
import type { PlanContent, PlanExercise, PlanPhase, SignOff } from './plan.ts';

type StandingPhase = PlanPhase & {
  /** The first phase opens with surgery, every other one by a clinician's sign-off. */
  openedOn: LocalDate | null;
  openedOnDay: number | null;
  current: boolean;
  usualStartDate: LocalDate;
  usualEndDate: LocalDate | null;
};

type PrecautionInForce = {
  code: string;
  icon: string;
  clinicianText: string;
  earliestWeek: number;
  earliestDate: LocalDate;
  usualWeek: number;
  usualDate: LocalDate;
  /** The earliest week is reached: a clinician may lift it without the surgeon's word. */
  mayBeLifted: boolean;
  /** The usual week is reached: a sign-off is due. It stays in force all the same. */
  due: boolean;
  /** The limit that holds on this day, where the precaution is one. */
  limitDegrees: number | null;
};

export type Standing = {
  day: number;
  week: number;
  phases: StandingPhase[];
  /** Null only before surgery. */
  phase: StandingPhase | null;
  precautions: PrecautionInForce[];
  exercises: PlanExercise[];
  /** The usual end of the current phase, when its sign-off falls due; negative days are overdue. */
  review: { day: number; week: number; date: LocalDate; daysTo: number } | null;
};

type StandingInput = {
  plan: PlanContent;
  surgeryDate: LocalDate;
  date: LocalDate;
  /** Those after the date are left out, so that a past day can be looked at again. */
  signOffs: readonly SignOff[];
};

const firstSignOff = (signOffs: readonly SignOff[], kind: SignOff['kind'], code: string): LocalDate | null =>
  signOffs
    .filter((signOff) => signOff.kind === kind && signOff.code === code)
    .map(({ on }) => on)
    .sort()[0] ?? null;

const phasesOn = ({ plan, surgeryDate, date, signOffs }: StandingInput): StandingPhase[] => {
  const opened = plan.phases.map(({ code }, index) =>
    index === 0 ? (surgeryDate <= date ? surgeryDate : null) : firstSignOff(signOffs, 'open-phase', code),
  );
  const currentIndex = opened.findLastIndex((on) => on !== null);
  return plan.phases.map((phase, index) => {
    const openedOn = opened[index] ?? null;
    return {
      ...phase,
      openedOn,
      openedOnDay: openedOn === null ? null : daysBetween(surgeryDate, openedOn),
      current: index === currentIndex,
      usualStartDate: dateOfWeek(surgeryDate, phase.usualStartWeek),
      usualEndDate: phase.usualEndWeek === null ? null : dateOfWeek(surgeryDate, phase.usualEndWeek),
    };
  });
};

/**
 * Where a person stands in the plan on a date. A precaution is in force from its week on until a clinician has
 * lifted it, however long that takes.
 */
export const standingOn = (input: StandingInput): Standing => {
  const { plan, surgeryDate, date } = input;
  const signOffs = input.signOffs.filter(({ on }) => on <= date);
  const day = dayPostOp(surgeryDate, date);
  const week = weekPostOp(day);
  const phases = phasesOn({ ...input, signOffs });
  const phase = phases.find(({ current }) => current) ?? null;
  const endWeek = phase?.usualEndWeek ?? null;
  return {
    day,
    week,
    phases,
    phase,
    precautions: plan.precautions
      .filter(
        ({ code, restrictFromWeek }) =>
          week >= restrictFromWeek && firstSignOff(signOffs, 'lift-precaution', code) === null,
      )
      .map(({ code, icon, clinicianText, liftEarliestWeek, liftUsualWeek, limitDegrees }) => ({
        code,
        icon,
        clinicianText,
        earliestWeek: liftEarliestWeek,
        earliestDate: dateOfWeek(surgeryDate, liftEarliestWeek),
        usualWeek: liftUsualWeek,
        usualDate: dateOfWeek(surgeryDate, liftUsualWeek),
        mayBeLifted: week >= liftEarliestWeek,
        due: week >= liftUsualWeek,
        limitDegrees: limitDegrees?.findLast(({ fromWeek }) => week >= fromWeek)?.degrees ?? null,
      })),
    exercises: plan.exercises.filter(({ fromWeek }) => day >= 0 && week >= fromWeek),
    review:
      endWeek === null
        ? null
        : {
            day: endWeek * 7,
            week: endWeek,
            date: addDays(surgeryDate, endWeek * 7),
            daysTo: endWeek * 7 - day,
          },
  };
};
