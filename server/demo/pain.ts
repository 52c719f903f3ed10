import type { Random } from './random.ts';

/** A person's pain before surgery and at the peak after it; the rest of the curve follows from the two. */
type PainCourse = { before: number; peak: number };

export const drawCourse = (random: Random): PainCourse => ({
  before: Math.min(8.5, Math.max(3.5, 5.8 + random.normal())),
  // The peak of a daily-diary study is 5.1 ± 2.7; its tails are cut, since they would all be flags.
  peak: Math.min(7, Math.max(2.5, 5.1 + 1.4 * random.normal())),
});

/**
 * The pain to expect on a day after surgery (reference bands of the domain): a peak about day 2, 37 % lower
 * than before surgery at 2 weeks, over 80 % of the final relief by 6 weeks, 67 % lower at 3 months.
 */
export const expectedPain = ({ before, peak }: PainCourse, day: number): number => {
  const points: [day: number, pain: number][] = [
    [0, peak * 0.6],
    [2, peak],
    [14, before * 0.63],
    [42, before * 0.42],
    [90, before * 0.33],
    [120, before * 0.28],
  ];
  const after = points.findIndex(([on]) => on >= day);
  const [toDay, to] = points[after] ?? [120, before * 0.28];
  const [fromDay, from] = points[after - 1] ?? [toDay, to];
  return toDay === fromDay ? to : from + ((to - from) * (day - fromDay)) / (toDay - fromDay);
};
