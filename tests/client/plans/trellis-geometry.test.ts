import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { TrellisData, TrellisDay } from '#shared/plans/trellis.ts';
import type { TrellisSize } from '#src/features/plans/trellis-frame.ts';
import { layOutTrellis } from '#src/features/plans/trellis-geometry.ts';
import type { TrellisLeaf } from '#src/features/plans/trellis-geometry.ts';
import { clashesOf, outlinesOf } from './outlines.ts';

/** Usual weeks of the reverse replacement plan, common practice (CP). */
const usual = [
  { name: 'Protect', usualStartDay: 0, usualEndDay: 42 },
  { name: 'Motion', usualStartDay: 42, usualEndDay: 84 },
  { name: 'Strength', usualStartDay: 84, usualEndDay: 112 },
  { name: 'Return', usualStartDay: 112, usualEndDay: null },
];

type Story = {
  today: number;
  openedOnDays: number[];
  arm?: TrellisData['arm'];
  kindOf?: (day: number) => TrellisDay['kind'];
  doneToday?: boolean;
  review?: TrellisData['review'];
};

function trellis({
  today,
  openedOnDays,
  arm = 'left',
  kindOf,
  doneToday = false,
  review = null,
}: Story): TrellisData {
  const lastDay = doneToday ? today : today - 1;
  return {
    arm,
    today,
    review,
    phases: usual.map((phase, index) => ({
      ...phase,
      code: phase.name.toLowerCase(),
      openedOnDay: openedOnDays[index] ?? null,
    })),
    days: Array.from({ length: Math.max(lastDay, 0) }, (_, index) => ({
      day: index + 1,
      kind: kindOf?.(index + 1) ?? 'check-in',
    })),
  };
}

const kinds = ['check-in', 'flagged', 'missed'] as const;

const anyStory = fc
  .record({
    lengths: fc.array(fc.integer({ min: 1, max: 140 }), { maxLength: 3 }),
    daysSince: fc.integer({ min: 0, max: 200 }),
    pattern: fc.array(fc.constantFrom(...kinds), { minLength: 1, maxLength: 40 }),
    doneToday: fc.boolean(),
    reviewIn: fc.option(fc.integer({ min: 0, max: 120 })),
  })
  .map(({ lengths, daysSince, pattern, doneToday, reviewIn }): Story => {
    const openedOnDays = [0];
    for (const length of lengths) openedOnDays.push(openedOnDays.at(-1)! + length);
    const today = openedOnDays.at(-1)! + daysSince;
    return {
      today,
      openedOnDays,
      doneToday,
      kindOf: (day) => pattern[day % pattern.length]!,
      review: reviewIn === null ? null : { day: today + reviewIn, week: 6, date: '2026-12-19' },
    };
  });

const sizes: TrellisSize[] = ['large', 'small'];

describe.each(sizes)('the %s trellis, for any recovery', (size) => {
  test('no leaf, bare node or ring of today overlaps another', () => {
    fc.assert(
      fc.property(anyStory, (story) => {
        const clashes = clashesOf(outlinesOf(layOutTrellis(trellis(story), size)));
        expect(clashes).toEqual([]);
      }),
      { numRuns: 60 },
    );
  });

  test('everything stays inside its box', () => {
    fc.assert(
      fc.property(anyStory, (story) => {
        const geometry = layOutTrellis(trellis(story), size);
        const ringWithStroke = { ...geometry.today, radius: geometry.today.radius + 1 };
        const points = outlinesOf({ ...geometry, today: ringWithStroke }).flatMap(({ outline }) => outline);
        for (const { tip } of geometry.branches) if (tip) points.push(tip);
        if (geometry.review) points.push(geometry.review);
        const outside = points.filter(
          ({ x, y }) => x < 0 || x > geometry.width || y < 0 || y > geometry.height,
        );
        expect(outside).toEqual([]);
      }),
      { numRuns: 150 },
    );
  });

  test('a right shoulder is the reflection of a left one', () => {
    fc.assert(
      fc.property(anyStory, (story) => {
        const left = layOutTrellis(trellis({ ...story, arm: 'left' }), size);
        const right = layOutTrellis(trellis({ ...story, arm: 'right' }), size);
        const footAndTip = ({ x, y, length, angle }: TrellisLeaf) => {
          const turn = (angle * Math.PI) / 180;
          return [x, y, x + length * Math.cos(turn), y + length * Math.sin(turn)];
        };
        const across = (x: number) => expect.closeTo(left.width - x, 6) as number;
        const level = (y: number) => expect.closeTo(y, 6) as number;
        const expectedLeaf = ([x1 = 0, y1 = 0, x2 = 0, y2 = 0]: number[]) => [
          across(x1),
          level(y1),
          across(x2),
          level(y2),
        ];
        expect(right.leaves.map(footAndTip)).toEqual(
          left.leaves.map((leaf) => expectedLeaf(footAndTip(leaf))),
        );
        expect(right.bareNodes.map(({ x }) => x)).toEqual(left.bareNodes.map(({ x }) => across(x)));
        expect(right.branches.map(({ endX }) => endX)).toEqual(left.branches.map(({ endX }) => across(endX)));
        expect(right.today.x).toEqual(across(left.today.x));
        expect(right.review?.x).toEqual(left.review ? across(left.review.x) : undefined);
      }),
      { numRuns: 60 },
    );
  });
});

describe('the large trellis', () => {
  test('has a leaf for each check-in, a fan for each flagged day and a bare node for each missed one', () => {
    const kindOf = (day: number) => (day === 5 ? 'missed' : day === 9 ? 'flagged' : 'check-in');
    const { leaves, bareNodes } = layOutTrellis(trellis({ today: 24, openedOnDays: [0], kindOf }), 'large');
    expect(leaves).toHaveLength(22);
    expect(leaves.filter(({ flagged }) => flagged)).toHaveLength(1);
    expect(bareNodes).toHaveLength(1);
  });

  test('leaves stand above and below the wire in turn', () => {
    const { leaves, wires } = layOutTrellis(trellis({ today: 10, openedOnDays: [0] }), 'large');
    const sides = leaves.map(({ y }) => (y < wires[0]!.y ? 'above' : 'below'));
    expect(sides).toEqual(['below', 'above', 'below', 'above', 'below', 'above', 'below', 'above', 'below']);
  });

  test('the first phase hangs on the lowest wire', () => {
    const { wires } = layOutTrellis(trellis({ today: 1, openedOnDays: [0] }), 'large');
    const heights = wires.map(({ y }) => y);
    expect(heights).toEqual([...heights].sort((a, b) => b - a));
  });

  test('the branch climbs on the day a clinician opened the phase, not on its usual day', () => {
    const waiting = layOutTrellis(trellis({ today: 45, openedOnDays: [0] }), 'large');
    expect(waiting.branches).toHaveLength(1);
    expect(waiting.today.y).toBe(waiting.wires[0]!.y);

    const opened = layOutTrellis(trellis({ today: 45, openedOnDays: [0, 45] }), 'large');
    expect(opened.branches).toHaveLength(2);
    expect(opened.today.y).toBe(opened.wires[1]!.y);
    expect(opened.trunk?.topY).toBe(opened.wires[1]!.y);
    expect(opened.branches[0]!.tip).not.toBeNull();
    expect(opened.branches[1]!.tip).toBeNull();
  });

  test('past wires keep their leaves', () => {
    const { leaves, wires } = layOutTrellis(trellis({ today: 60, openedOnDays: [0, 42] }), 'large');
    const onLowest = leaves.filter(({ y }) => Math.abs(y - wires[0]!.y) < 5);
    expect(onLowest).toHaveLength(41);
  });

  test('a phase that was opened early leaves the rest of the lower wire bare', () => {
    const early = layOutTrellis(trellis({ today: 45, openedOnDays: [0, 21] }), 'large');
    const usualDay = layOutTrellis(trellis({ today: 45, openedOnDays: [0, 42] }), 'large');
    expect(early.branches[0]!.endX).toBeLessThan(usualDay.branches[0]!.endX - 100);
  });

  test('a phase that runs longer than usual is drawn denser and keeps to its wire', () => {
    const onTime = layOutTrellis(trellis({ today: 40, openedOnDays: [0] }), 'large');
    const late = layOutTrellis(trellis({ today: 90, openedOnDays: [0] }), 'large');
    const gap = ({ leaves }: typeof late) => leaves[1]!.x - leaves[0]!.x;
    expect(gap(late)).toBeLessThan(gap(onTime) / 2 + 0.1);
    expect(late.leaves).toHaveLength(89);
  });

  test('today has a ring, and a leaf out of it once it has its check-in', () => {
    const before = layOutTrellis(trellis({ today: 24, openedOnDays: [0] }), 'large');
    const after = layOutTrellis(trellis({ today: 24, openedOnDays: [0], doneToday: true }), 'large');
    expect(after.leaves).toHaveLength(before.leaves.length + 1);
    expect(after.today).toEqual(before.today);
  });

  test('before any phase is opened there are wires and a ring, and no trunk', () => {
    const geometry = layOutTrellis(trellis({ today: 0, openedOnDays: [] }), 'large');
    expect(geometry.trunk).toBeNull();
    expect(geometry.branches).toEqual([]);
    expect(geometry.wires).toHaveLength(4);
    expect(geometry.today.y).toBe(geometry.wires[0]!.y);
  });

  const review = (day: number) => ({ day, week: day / 7, date: '2026-12-19' });

  test.each([
    { name: 'at the usual end of the phase', today: 24, openedOnDays: [0], day: 42, wire: 0 },
    {
      name: 'past the usual end of a phase that waits for it',
      today: 50,
      openedOnDays: [0],
      day: 56,
      wire: 0,
    },
    { name: 'on a wire still ahead', today: 24, openedOnDays: [0], day: 84, wire: 1 },
    { name: 'after a phase was opened early', today: 45, openedOnDays: [0, 30], day: 84, wire: 1 },
    { name: 'today', today: 42, openedOnDays: [0], day: 42, wire: 0 },
    { name: 'a year later', today: 120, openedOnDays: [0, 42, 84, 112], day: 365, wire: 3 },
  ])('the review is marked $name, never behind today', ({ today, openedOnDays, day, wire }) => {
    const geometry = layOutTrellis(trellis({ today, openedOnDays, review: review(day) }), 'large');
    expect(geometry.review?.y).toBe(geometry.wires[wire]!.y);
    if (geometry.review?.y === geometry.today.y) {
      expect(geometry.review.x).toBeGreaterThanOrEqual(geometry.today.x);
    }
  });

  test('a review whose day has passed is not marked', () => {
    const geometry = layOutTrellis(trellis({ today: 50, openedOnDays: [0], review: review(42) }), 'large');
    expect(geometry.review).toBeNull();
  });
});

describe('the small trellis', () => {
  test('has a leaf a week, flagged if any day of the week was, and bare only if every day was missed', () => {
    const kindOf = (day: number) => (day >= 7 && day < 14 ? 'missed' : day === 15 ? 'flagged' : 'check-in');
    const { leaves, bareNodes } = layOutTrellis(trellis({ today: 29, openedOnDays: [0], kindOf }), 'small');
    expect(leaves.map(({ flagged }) => flagged)).toEqual([false, true, false]);
    expect(bareNodes).toHaveLength(1);
  });

  test('fits the row of a table at 124 by 38', () => {
    const { width, height } = layOutTrellis(trellis({ today: 118, openedOnDays: [0, 42, 84, 112] }), 'small');
    expect({ width, height }).toEqual({ width: 124, height: 38 });
  });
});
