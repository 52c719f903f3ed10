import { describe, expect, test } from 'vitest';
import { addDays } from '#shared/plans/calendar.ts';
import { reverseReplacement as plan } from '#shared/plans/reverse-replacement.ts';
import { standingOn } from '#shared/plans/standing.ts';
import { trellisFrom, type CheckInDay } from '#shared/plans/trellis.ts';

const surgeryDate = '2025-11-07';
const on = (day: number, flagged = false): CheckInDay => ({ date: addDays(surgeryDate, day), flagged });
const trellisOn = (day: number, checkInDays: CheckInDay[]) =>
  trellisFrom({
    arm: 'left',
    surgeryDate,
    standing: standingOn({ plan, surgeryDate, date: addDays(surgeryDate, day), signOffs: [] }),
    checkInDays,
  });

describe('the trellis', () => {
  test('has a leaf for a day with a check-in, another for a flagged day, a bare node for a missed one', () => {
    expect(trellisOn(4, [on(1), on(3, true)]).days).toEqual([
      { day: 1, kind: 'check-in' },
      { day: 2, kind: 'missed' },
      { day: 3, kind: 'flagged' },
    ]);
  });

  test('today is never missed, and has its leaf once there is a check-in; so has the day of surgery', () => {
    expect(trellisOn(2, [on(1)]).days).toEqual([{ day: 1, kind: 'check-in' }]);
    expect(trellisOn(2, [on(0), on(1), on(2)]).days.map(({ day }) => day)).toEqual([0, 1, 2]);
  });

  test('a day of several check-ins is flagged when any of them was', () => {
    expect(trellisOn(2, [on(1), on(1, true), on(1)]).days).toEqual([{ day: 1, kind: 'flagged' }]);
  });

  test('has a wire for each phase, and the next review', () => {
    const trellis = trellisOn(24, []);
    expect(trellis).toMatchObject({
      arm: 'left',
      today: 24,
      review: { day: 42, week: 6, date: '2025-12-19' },
    });
    expect(trellis.phases).toEqual([
      { code: 'protect', name: 'Protect', openedOnDay: 0, usualStartDay: 0, usualEndDay: 42 },
      { code: 'motion', name: 'Motion', openedOnDay: null, usualStartDay: 42, usualEndDay: 84 },
      { code: 'strength', name: 'Strength', openedOnDay: null, usualStartDay: 84, usualEndDay: 112 },
      { code: 'return', name: 'Return', openedOnDay: null, usualStartDay: 112, usualEndDay: null },
    ]);
  });

  test('is empty before surgery', () => {
    expect(trellisOn(-5, []).days).toEqual([]);
  });
});
