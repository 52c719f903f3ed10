import type { TFunction } from 'i18next';
import type { Today } from '#shared/plans/contract.ts';

type Exercise = Today['exercises'][number];
type Range = [number, number];

function rangeWords(t: TFunction<'plan'>, name: 'reps' | 'hold' | 'sessions', range: Range | null): string[] {
  if (!range) return [];
  const [low, high] = range;
  const key = low === high && name !== 'hold' ? `dosage.${name}-exact` : `dosage.${name}`;
  return [t(key, { low, high })];
}

/** "10 to 20 times, hold 5 to 10 seconds, 3 to 4 times a day". */
export function dosageWords(t: TFunction<'plan'>, { reps, holdSeconds, sessionsPerDay }: Exercise): string {
  const parts = [
    ...rangeWords(t, 'reps', reps),
    ...rangeWords(t, 'hold', holdSeconds),
    ...rangeWords(t, 'sessions', sessionsPerDay),
  ];
  const words = parts.length > 0 ? parts.join(', ') : t('dosage.set-by-clinician');
  return `${words.charAt(0).toLocaleUpperCase()}${words.slice(1)}`;
}
