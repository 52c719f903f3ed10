import { addDays, type LocalDate } from './calendar.ts';
import type { Standing } from './standing.ts';

/** What the trellis draws: a wire a phase, a leaf a check-in. Days count from the surgery date (day 0). */
export type TrellisData = {
  arm: 'left' | 'right';
  /** Today's day after surgery. */
  today: number;
  phases: TrellisPhase[];
  /** Past days in order; today itself is drawn as a ring, with a leaf once it has a check-in. */
  days: TrellisDay[];
  /** The next planned review, where one is known. */
  review: { day: number; week: number; date: string } | null;
};

export type TrellisPhase = {
  code: string;
  name: string;
  /** The day a clinician opened it, or null while it is still ahead. */
  openedOnDay: number | null;
  usualStartDay: number;
  /** Null for the last phase, which has no usual end. */
  usualEndDay: number | null;
};

export type TrellisDay = { day: number; kind: 'check-in' | 'flagged' | 'missed' };

/** A date on which there was at least one check-in, and whether any of its check-ins raised a flag. */
export type CheckInDay = { date: LocalDate; flagged: boolean };

/**
 * The trellis of a person on a date. Days are counted from day 1; the day of surgery and today are never
 * missed, so they stand in it only once they have a check-in.
 */
export const trellisFrom = (input: {
  arm: 'left' | 'right';
  surgeryDate: LocalDate;
  standing: Standing;
  checkInDays: readonly CheckInDay[];
}): TrellisData => {
  const { arm, surgeryDate, standing, checkInDays } = input;
  const days = Array.from({ length: Math.max(0, standing.day + 1) }, (_, day): TrellisDay | null => {
    const date = addDays(surgeryDate, day);
    const found = checkInDays.filter((checkInDay) => checkInDay.date === date);
    if (found.some(({ flagged }) => flagged)) return { day, kind: 'flagged' };
    if (found.length > 0) return { day, kind: 'check-in' };
    return day === 0 || day === standing.day ? null : { day, kind: 'missed' };
  });
  return {
    arm,
    today: standing.day,
    phases: standing.phases.map(({ code, name, openedOnDay, usualStartWeek, usualEndWeek }) => ({
      code,
      name,
      openedOnDay,
      usualStartDay: usualStartWeek * 7,
      usualEndDay: usualEndWeek === null ? null : usualEndWeek * 7,
    })),
    days: days.filter((day) => day !== null),
    review: standing.review && {
      day: standing.review.day,
      week: standing.review.week,
      date: standing.review.date,
    },
  };
};
