import { kindRules, type NotificationKind } from '#shared/notifications/kinds.ts';

const secondMs = 1_000;
const minuteMs = 60 * secondMs;
const hourMs = 60 * minuteMs;

/** The pause after each failed try; after these it is an hour every time. */
const pausesMs = [
  5 * secondMs,
  15 * secondMs,
  30 * secondMs,
  minuteMs,
  2 * minuteMs,
  5 * minuteMs,
  10 * minuteMs,
  20 * minuteMs,
  30 * minuteMs,
];

/** A page is tried at least this often for as long as it is fresh. */
const pageFreshForMs = 10 * minuteMs;
const pagePauseMs = 30 * secondMs;

/** What is this old is given up, once the first pauses have been used; what was sent again by hand has those too. */
const givenUpAfterMs = 24 * hourMs;

/** When to try again after so many failed tries; null when it is over, and a person has to see to it. */
export const nextTry = (
  { kind, createdAt, attempts }: { kind: NotificationKind; createdAt: Date; attempts: number },
  now: Date,
): Date | null => {
  const ageMs = now.getTime() - createdAt.getTime();
  const pause = pausesMs[attempts - 1];
  if (pause === undefined && ageMs >= givenUpAfterMs) return null;
  const pauseMs = pause ?? hourMs;
  const isFreshPage = kindRules[kind].mustReach && ageMs < pageFreshForMs;
  return new Date(now.getTime() + (isFreshPage ? Math.min(pauseMs, pagePauseMs) : pauseMs));
};
