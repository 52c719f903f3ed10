import { TZDate } from '@date-fns/tz';

/**
 * Opening hours by weekday, 0 = Sunday, in the clinic's own time zone, times as 08:00. A day without an entry is
 * closed; one with several is closed in between.
 */
export type OpeningHours = { weekday: number; opens: string; closes: string }[];

const minutesOf = (time: string): number => Number(time.slice(0, 2)) * 60 + Number(time.slice(3, 5));

export const isOpenAt = (hours: OpeningHours, timeZone: string, at: Date): boolean => {
  const local = new TZDate(at, timeZone);
  const minute = local.getHours() * 60 + local.getMinutes();
  return hours.some(
    ({ weekday, opens, closes }) =>
      weekday === local.getDay() && minute >= minutesOf(opens) && minute < minutesOf(closes),
  );
};

/** The next instant at which the clinic opens after `at`; null for a clinic without hours. */
export const nextOpening = (hours: OpeningHours, timeZone: string, at: Date): Date | null => {
  const local = new TZDate(at, timeZone);
  for (let ahead = 0; ahead <= 7; ahead += 1) {
    const day = new TZDate(local.getFullYear(), local.getMonth(), local.getDate() + ahead, 0, 0, 0, timeZone);
    const openings = hours
      .filter(({ weekday }) => weekday === day.getDay())
      .map(({ opens }) => {
        const [hour = 0, minute = 0] = opens.split(':').map(Number);
        return new TZDate(day.getFullYear(), day.getMonth(), day.getDate(), hour, minute, 0, timeZone);
      })
      .filter((opening) => opening.getTime() > at.getTime())
      .sort((a, b) => a.getTime() - b.getTime());
    const first = openings[0];
    if (first) return new Date(first.getTime());
  }
  return null;
};
