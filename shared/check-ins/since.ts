import { daysBetween, type LocalDate } from '../plans/calendar.ts';

type Since = {
  /** The words, as a key of the check-in's texts. */
  key: 'check-in:since.surgery' | 'check-in:since.today' | 'check-in:since.weekday' | 'check-in:since.date';
  /** Filled into the words as a weekday or a date; null where the words need none. */
  date: LocalDate | null;
};

/**
 * What "since" means in the questions: since surgery for the first check-in ever, then since the last one, by
 * its weekday while that is clear, by its date from a week on.
 */
export const sinceLastCheckIn = (lastCheckInDate: LocalDate | null, today: LocalDate): Since => {
  if (lastCheckInDate === null) return { key: 'check-in:since.surgery', date: null };
  const days = daysBetween(lastCheckInDate, today);
  if (days <= 0) return { key: 'check-in:since.today', date: null };
  return { key: days < 7 ? 'check-in:since.weekday' : 'check-in:since.date', date: lastCheckInDate };
};
