import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { endOfQuiet, wallTime } from '#server/notifications/quiet-hours.ts';

const night = { from: '21:00', until: '07:00' };
const at = (text: string, zone: string) => DateTime.fromISO(text, { zone }).toJSDate();
const endAt = (quiet: { from: string; until: string }, zone: string, text: string) =>
  endOfQuiet(quiet, zone, new Date(text)).toISOString();

// The dates of the clock changes are those of the IANA database; luxon is the second library that reads it.
describe('quiet hours', () => {
  it.each([
    ['before they begin', '2026-07-01T20:59:59', '2026-07-01T20:59:59'],
    ['in the evening', '2026-07-01T21:00', '2026-07-02T07:00'],
    ['after midnight', '2026-07-02T03:12:45', '2026-07-02T07:00'],
    ['as they end', '2026-07-02T07:00', '2026-07-02T07:00'],
  ])('hold a word back %s', (_when, now, end) => {
    const zone = 'America/New_York';
    expect(endOfQuiet(night, zone, at(now, zone))).toEqual(at(end, zone));
  });

  it('within one day end on that day', () => {
    const noon = { from: '12:00', until: '14:00' };
    expect(endOfQuiet(noon, 'Europe/Berlin', at('2026-05-05T13:59', 'Europe/Berlin'))).toEqual(
      at('2026-05-05T14:00', 'Europe/Berlin'),
    );
  });

  it('that begin as they end are none', () => {
    const now = new Date('2026-05-05T07:00:30Z');
    expect(endOfQuiet({ from: '07:00', until: '07:00' }, 'Etc/UTC', now)).toBe(now);
  });

  it.each([
    // Clocks go from 02:00 to 03:00 on 8 March 2026 in New York: the night has nine hours.
    ['a short night', night, '2026-03-08T02:00:00Z', '2026-03-08T11:00:00.000Z'],
    // And from 02:00 back to 01:00 on 1 November 2026: eleven hours.
    ['a long night', night, '2026-11-01T01:00:00Z', '2026-11-01T12:00:00.000Z'],
    // 02:30 does not come on 8 March; the first moment after the gap is 03:00.
    [
      'an end that is skipped',
      { from: '21:00', until: '02:30' },
      '2026-03-08T03:00:00Z',
      '2026-03-08T07:00:00.000Z',
    ],
    // 01:30 comes twice on 1 November; it is over the first time, and begins anew at the second 01:00.
    [
      'an end that comes twice',
      { from: '21:00', until: '01:30' },
      '2026-11-01T03:00:00Z',
      '2026-11-01T05:30:00.000Z',
    ],
    [
      'its second time',
      { from: '21:00', until: '01:30' },
      '2026-11-01T06:10:00Z',
      '2026-11-01T06:30:00.000Z',
    ],
  ])('are right over a clock change: %s', (_what, quiet, now, end) => {
    expect(endAt(quiet, 'America/New_York', now)).toBe(end);
  });

  it('end at the first moment outside them, in every zone, as a second library reads the clock', () => {
    const zones = [
      'America/New_York',
      'Europe/Berlin',
      'Australia/Lord_Howe',
      'Asia/Kathmandu',
      'Pacific/Apia',
    ];
    const time = fc
      .tuple(fc.integer({ min: 0, max: 23 }), fc.integer({ min: 0, max: 59 }))
      .map(([hour, minute]) => `${String(hour).padStart(2, '0')}:${String(minute).padStart(2, '0')}`);
    const anyInstant = fc.date({
      min: new Date('2026-01-01'),
      max: new Date('2027-12-31'),
      noInvalidDate: true,
    });
    fc.assert(
      fc.property(fc.constantFrom(...zones), time, time, anyInstant, (zone, from, until, now) => {
        const clock = (instant: number) => DateTime.fromMillis(instant, { zone }).toFormat('HH:mm');
        const isQuiet = (instant: number) =>
          from <= until
            ? from <= clock(instant) && clock(instant) < until
            : from <= clock(instant) || clock(instant) < until;
        const end = endOfQuiet({ from, until }, zone, now).getTime();
        expect(wallTime(zone, now)).toBe(clock(now.getTime()));
        expect(isQuiet(end)).toBe(false);
        expect(end).toBeGreaterThanOrEqual(now.getTime());
        for (let before = now.getTime(); before < end; before += 7 * 60_000)
          expect(isQuiet(before)).toBe(true);
        if (end > now.getTime()) expect(isQuiet(end - 1)).toBe(true);
      }),
      { numRuns: 200 },
    );
  });
});
