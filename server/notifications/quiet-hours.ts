import { tzOffset } from '@date-fns/tz';

const minuteMs = 60_000;

/** What a clock on the wall shows in a zone, as 07:05. */
export const wallTime = (timeZone: string, instant: Date): string =>
  new Date(instant.getTime() + tzOffset(timeZone, instant) * minuteMs).toISOString().slice(11, 16);

/** Two times of the wall clock; the hours from the first up to the second, past midnight where it is earlier. */
export type QuietHours = { from: string; until: string };

const isWithin = ({ from, until }: QuietHours, time: string): boolean =>
  from <= until ? from <= time && time < until : from <= time || time < until;

/**
 * The first moment from now on at which nobody asked for quiet. It walks the clock minute by minute, a day at most,
 * so that an hour that is skipped or comes twice needs no rule of its own: where the end lies in a skipped hour,
 * quiet ends when the clock has skipped it.
 */
export const endOfQuiet = (quiet: QuietHours | null, timeZone: string, now: Date): Date => {
  if (!quiet || !isWithin(quiet, wallTime(timeZone, now))) return now;
  let at = Math.floor(now.getTime() / minuteMs) * minuteMs;
  while (isWithin(quiet, wallTime(timeZone, new Date(at)))) at += minuteMs;
  return new Date(at);
};
