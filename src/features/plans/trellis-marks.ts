import type { TrellisDay } from '#shared/plans/trellis.ts';

export type TrellisMark = {
  /** Days since the phase was opened. */
  at: number;
  /** Even places stand above the wire; odd ones below it where both sides are used. */
  place: number;
  kind: TrellisDay['kind'];
};

/** One mark a day. */
export function dailyMarks(days: TrellisDay[], opened: number): TrellisMark[] {
  return days.map(({ day, kind }) => ({ at: day - opened, place: day - opened, kind }));
}

/** One mark a week: a flag shows above everything, and a week is bare only if it has no check-in at all. */
export function weeklyMarks(days: TrellisDay[], opened: number, end: number, closed: boolean): TrellisMark[] {
  const marks: TrellisMark[] = [];
  for (let week = 0; opened + week * 7 < end; week += 1) {
    const lasted = Math.min(7, end - opened - week * 7);
    // The week under way is told by the ring of today; the rest of a closed phase counts from half a week.
    if (lasted < (closed ? 4 : 7)) continue;
    const own = days.filter(({ day }) => Math.floor((day - opened) / 7) === week);
    if (own.length === 0) continue;
    const kinds = own.map(({ kind }) => kind);
    const kind = kinds.includes('flagged') ? 'flagged' : kinds.includes('check-in') ? 'check-in' : 'missed';
    marks.push({ at: week * 7 + 3.5, place: week, kind });
  }
  return marks;
}
