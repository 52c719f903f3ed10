import { TZDate } from '@date-fns/tz';
import { addDays, weekday, type LocalDate } from '#shared/plans/calendar.ts';
import { demoTimeZone } from './clinic.ts';

/** A time of day as minutes after midnight. */
export const clock = (time: `${number}:${number}`): number => {
  const [hours = 0, minutes = 0] = time.split(':').map(Number);
  return hours * 60 + minutes;
};

/** The instant of a local date and time of day in the clinic's zone. */
export const instantAt = (date: LocalDate, minutes: number, seconds = 0): Date => {
  const [year = 0, month = 1, day = 1] = date.split('-').map(Number);
  const local = new TZDate(
    year,
    month - 1,
    day,
    Math.floor(minutes / 60),
    minutes % 60,
    seconds,
    demoTimeZone,
  );
  return new Date(local.getTime());
};

export const secondsAfter = (instant: Date, seconds: number): Date =>
  new Date(instant.getTime() + Math.round(seconds * 1000));

export const minutesAfter = (instant: Date, minutes: number): Date => secondsAfter(instant, minutes * 60);

export const isWorkingDay = (date: LocalDate): boolean => weekday(date) >= 1 && weekday(date) <= 5;

/** The date itself where it is a working day, else the next one. */
export const workingDayFrom = (date: LocalDate): LocalDate =>
  isWorkingDay(date) ? date : workingDayFrom(addDays(date, 1));

/** The n-th working day before a date; the date itself does not count. */
export const workingDayBefore = (date: LocalDate, n: number): LocalDate => {
  const before = addDays(date, -1);
  if (!isWorkingDay(before)) return workingDayBefore(before, n);
  return n <= 1 ? before : workingDayBefore(before, n - 1);
};
