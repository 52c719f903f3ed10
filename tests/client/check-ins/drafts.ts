import type { CheckInContext } from '#shared/check-ins/contract.ts';
import { newDraft } from '#src/features/check-ins/draft.ts';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';

export const inesContext: CheckInContext = {
  day: 24,
  date: '2026-12-01',
  timeZone: 'America/New_York',
  lastCheckInDate: '2026-11-27',
  usual: { painNow: 3.3, painWorst: 4.7 },
  history: [3, 3, 4].map((painNow, index) => ({
    answeredAt: `2026-11-2${index + 5}T13:00:00.000Z`,
    painNow,
    painWorst: painNow + 1,
    byProxy: false,
  })),
  operationCard: { arm: 'left', procedure: 'reverse-replacement', block: 'single' },
  safetyFacts: { bloodThinner: false },
  precautionsInForce: ['sling', 'across-behind'],
};

export const aDraft = (part: Partial<CheckInDraft> = {}): CheckInDraft => ({
  ...newDraft('full', inesContext, 'pain-now', 'a3c0a6f4-2f0f-4f0c-9d36-0a1f5ad7a111'),
  ...part,
});

/** Ids in the order in which they are asked for. */
export function countedIds(): () => string {
  let count = 0;
  return () => {
    count += 1;
    return `id-${count}`;
  };
}
