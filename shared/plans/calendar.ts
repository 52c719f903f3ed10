import { TZDate } from '@date-fns/tz';

/**
 * A calendar date without a time, as YYYY-MM-DD. Arithmetic runs on UTC midnights, where every day has 24
 * hours, so a clock change moves nothing.
 */
export type LocalDate = string;

const dayMs = 86_400_000;

const utcMidnight = (date: LocalDate): number => {
  const ms = Date.parse(`${date}T00:00:00Z`);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(date) || Number.isNaN(ms) || dateOf(ms) !== date) {
    throw new RangeError(`"${date}" is not a date as YYYY-MM-DD.`);
  }
  return ms;
};

const dateOf = (ms: number): LocalDate => new Date(ms).toISOString().slice(0, 10);

/** Whole dates from the first to the second; negative when the second is earlier. */
export const daysBetween = (from: LocalDate, to: LocalDate): number =>
  (utcMidnight(to) - utcMidnight(from)) / dayMs;

export const addDays = (date: LocalDate, days: number): LocalDate => dateOf(utcMidnight(date) + days * dayMs);

/** 0 is Sunday, 6 is Saturday. */
export const weekday = (date: LocalDate): number => new Date(utcMidnight(date)).getUTCDay();

/** Whole local dates since surgery; the surgery date is day 0, the day before is -1. */
export const dayPostOp = (surgeryDate: LocalDate, date: LocalDate): number => daysBetween(surgeryDate, date);

/** Whole weeks since surgery: days 0 to 6 are week 0, so "until week 12" ends on day 84. */
export const weekPostOp = (day: number): number => Math.floor(day / 7);

/** The date on which a week after surgery begins. */
export const dateOfWeek = (surgeryDate: LocalDate, week: number): LocalDate => addDays(surgeryDate, week * 7);

/** The calendar date that people in the time zone have at this instant. */
export const localDateIn = (timeZone: string, instant: Date): LocalDate => {
  const local = new TZDate(instant, timeZone);
  return dateOf(Date.UTC(local.getFullYear(), local.getMonth(), local.getDate()));
};
