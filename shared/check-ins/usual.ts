/** An earlier check-in, as far as the person's own usual needs it. */
export type EarlierCheckIn = {
  /** An instant in ISO 8601. */
  answeredAt: string;
  painNow: number | null;
  painWorst: number | null;
  /** A caregiver's estimate of pain stays out of the person's usual. */
  byProxy: boolean;
};

export type Usual = { painNow: number | null; painWorst: number | null };

const lastCount = 3;

const meanOfLast = (newestFirst: readonly EarlierCheckIn[], key: 'painNow' | 'painWorst'): number | null => {
  const values = newestFirst.flatMap((entry) => entry[key] ?? []).slice(0, lastCount);
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length;
};

/**
 * The mean of the person's last three check-ins, of fewer where there are fewer, null where there is none. The
 * order in which they come does not matter. Exact: it is rounded for show only.
 */
export const usualOf = (earlier: readonly EarlierCheckIn[]): Usual => {
  const newestFirst = earlier
    .filter(({ byProxy }) => !byProxy)
    .sort((a, b) => Date.parse(b.answeredAt) - Date.parse(a.answeredAt));
  return { painNow: meanOfLast(newestFirst, 'painNow'), painWorst: meanOfLast(newestFirst, 'painWorst') };
};
