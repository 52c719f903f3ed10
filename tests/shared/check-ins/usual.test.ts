import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { usualOf, type EarlierCheckIn } from '#shared/check-ins/usual.ts';
import { anyHistory } from './arbitraries.ts';

const on = (date: string, painNow: number | null, byProxy = false): EarlierCheckIn => ({
  answeredAt: `${date}T08:00:00Z`,
  painNow,
  painWorst: null,
  byProxy,
});

describe("a person's own usual", () => {
  // domain.md section 3: the mean of their last 3 check-ins.
  test('is the mean of the last three', () => {
    const history = [on('2025-11-01', 9), on('2025-11-02', 3), on('2025-11-03', 4), on('2025-11-04', 5)];
    expect(usualOf(history).painNow).toBe(4);
  });

  test('is the mean of fewer where there are fewer, and unknown where there is none', () => {
    expect(usualOf([on('2025-11-01', 3), on('2025-11-02', 4)]).painNow).toBe(3.5);
    expect(usualOf([])).toEqual({ painNow: null, painWorst: null });
  });

  test("leaves out a caregiver's estimate and check-ins without a number", () => {
    const history = [on('2025-11-01', 2), on('2025-11-02', 8, true), on('2025-11-03', null)];
    expect(usualOf(history).painNow).toBe(2);
  });

  test('does not depend on the order in which the check-ins come', () => {
    fc.assert(
      fc.property(anyHistory, fc.infiniteStream(fc.nat()), (history, keys) => {
        const shuffled = history
          .map((entry) => ({ entry, key: keys.next().value as number }))
          .sort((a, b) => a.key - b.key)
          .map(({ entry }) => entry);
        expect(usualOf(shuffled)).toEqual(usualOf(history));
      }),
    );
  });
});
