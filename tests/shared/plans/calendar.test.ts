import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, test } from 'vitest';
import {
  addDays,
  dateOfWeek,
  dayPostOp,
  daysBetween,
  localDateIn,
  weekPostOp,
  weekday,
} from '#shared/plans/calendar.ts';

const anyDay = fc.integer({ min: 0, max: 365 * 60 });
const dateAfter2000 = (days: number): string => DateTime.utc(2000, 1, 1).plus({ days }).toISODate()!;

/** Zones whose clocks change in the north, in the south, by half an hour, and not at all; and one that lost a day. */
const tenZones = [
  'America/New_York',
  'America/Los_Angeles',
  'America/St_Johns',
  'America/Phoenix',
  'Europe/London',
  'Europe/Helsinki',
  'Asia/Kolkata',
  'Australia/Lord_Howe',
  'Pacific/Auckland',
  'Pacific/Apia',
];

describe('the recovery calendar, against luxon as a second date library', () => {
  test('days between two dates, and adding them, agree', () => {
    fc.assert(
      fc.property(anyDay, fc.integer({ min: -800, max: 800 }), (from, days) => {
        const start = dateAfter2000(from);
        const end = DateTime.fromISO(start, { zone: 'utc' }).plus({ days }).toISODate();
        expect(addDays(start, days)).toBe(end);
        expect(daysBetween(start, end!)).toBe(days);
      }),
    );
  });

  test('weekdays agree', () => {
    fc.assert(
      fc.property(anyDay, (days) => {
        const date = dateAfter2000(days);
        expect(weekday(date)).toBe(DateTime.fromISO(date, { zone: 'utc' }).weekday % 7);
      }),
    );
  });

  test.each(tenZones)('the local date of an instant in %s agrees', (zone) => {
    fc.assert(
      fc.property(
        fc.date({ min: new Date('2005-01-01'), max: new Date('2035-01-01'), noInvalidDate: true }),
        (at) => {
          expect(localDateIn(zone, at)).toBe(DateTime.fromJSDate(at, { zone }).toISODate());
        },
      ),
    );
  });

  test.each(tenZones)(
    'clock changes in %s move nothing: noon of every day of two years is its own day',
    (zone) => {
      const surgery = '2025-01-15';
      let noon = DateTime.fromISO(`${surgery}T12:00`, { zone });
      for (let day = 0; day < 730; day += 1) {
        expect(dayPostOp(surgery, localDateIn(zone, noon.toJSDate()))).toBe(day);
        noon = noon.plus({ days: 1 });
      }
    },
  );
});

describe('days after surgery', () => {
  // domain.md section 1: surgery date is day 0, weekPostOp = floor(day / 7).
  test('the surgery date is day 0, and the day before is -1', () => {
    expect(dayPostOp('2025-11-07', '2025-11-07')).toBe(0);
    expect(dayPostOp('2025-11-07', '2025-12-01')).toBe(24);
    expect(dayPostOp('2025-11-07', '2025-11-06')).toBe(-1);
  });

  test.each([
    [0, 0],
    [6, 0],
    [7, 1],
    [83, 11],
    [84, 12],
    [-1, -1],
  ])('day %i is in week %i', (day, week) => {
    expect(weekPostOp(day)).toBe(week);
  });

  // domain.md section 1: "until week 12" is no longer in force on day 84.
  test('"until week 12" ends on day 84', () => {
    expect(dayPostOp('2025-11-07', dateOfWeek('2025-11-07', 12))).toBe(84);
    expect(dateOfWeek('2025-11-07', 12)).toBe('2026-01-30');
  });

  test.each(['2025-02-29', '2025-13-01', '2025-1-1', '1 Dec 2025', '2025-12-01T00:00', ''])(
    '"%s" is refused as a date, by its own words',
    (date) => {
      expect(() => addDays(date, 1)).toThrow(`"${date}" is not a date as YYYY-MM-DD.`);
    },
  );
});
