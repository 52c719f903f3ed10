/** Dates and times are written day first and in 24 hours, in the words of the application's language. */
const locale = 'en-GB';

/** A calendar date has no zone; it is read and written in UTC, where no clock change moves it. */
const asInstant = (localDate: string): Date => new Date(`${localDate}T00:00:00Z`);

function format(instant: Date, options: Intl.DateTimeFormatOptions): string {
  return new Intl.DateTimeFormat(locale, options).format(instant);
}

/** "19 Dec". */
export const formatDate = (localDate: string): string =>
  format(asInstant(localDate), { day: 'numeric', month: 'short', timeZone: 'UTC' });

/** "9 Mar 1957". */
export const formatDateAndYear = (localDate: string): string =>
  format(asInstant(localDate), { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' });

/** "Friday". */
export const formatWeekday = (localDate: string): string =>
  format(asInstant(localDate), { weekday: 'long', timeZone: 'UTC' });

/** "Fri 19 Dec". */
export const formatDayAndDate = (localDate: string): string =>
  format(asInstant(localDate), { weekday: 'short', day: 'numeric', month: 'short', timeZone: 'UTC' }).replace(
    ',',
    '',
  );

/** "08:41", in the device's zone unless another is named. */
export const formatTime = (instant: string, timeZone?: string): string =>
  format(new Date(instant), { hour: '2-digit', minute: '2-digit', timeZone });

/** The calendar date of an instant as YYYY-MM-DD, in the device's zone unless another is named. */
export const localDateOf = (instant: string | number, timeZone?: string): string =>
  new Intl.DateTimeFormat('en-CA', { year: 'numeric', month: '2-digit', day: '2-digit', timeZone }).format(
    new Date(instant),
  );

/** "08:41" today, "Thu 08:41" within a week, else "19 Dec 08:41". */
export function formatMoment(instant: string, nowMs: number, timeZone?: string): string {
  const time = formatTime(instant, timeZone);
  const date = localDateOf(instant, timeZone);
  if (date === localDateOf(nowMs, timeZone)) return time;
  const apartMs = Math.abs(nowMs - Date.parse(instant));
  const day = apartMs < 6 * 86_400_000 ? formatWeekday(date).slice(0, 3) : formatDate(date);
  return `${day} ${time}`;
}

/** `tel:` with the digits only; a leading plus stays. */
export const telephoneHref = (number: string): string => `tel:${number.replace(/[^+\d]/g, '')}`;
