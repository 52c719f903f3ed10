import type { Me } from '#shared/accounts/contract.ts';
import { readFromDevice } from '#src/lib/device-store.ts';

/** The names under which a check-in's parts are kept on the device. */
export const keptNames = {
  draft: { full: 'check-in', 'something-new': 'something-new' },
  alerts: 'alerts',
} as const;

/** Whose storage it is, and whether it may outlive the tab: only where the person chose to stay signed in. */
export const storeOf = ({ personId, session }: Me) => ({
  personId,
  onDevice: session.idleEndsAt === null,
});

/** Whether a draft of this kind is under way for this date. Cheap: Today asks without the check-in's code. */
export function hasDraft(me: Me, mode: keyof typeof keptNames.draft, date: string): boolean {
  const kept = readFromDevice(storeOf(me), keptNames.draft[mode]);
  return typeof kept === 'object' && kept !== null && 'date' in kept && kept.date === date;
}

/** Whether an alert still waits to be sent. */
export function hasWaitingAlerts(me: Me): boolean {
  const kept = readFromDevice(storeOf(me), keptNames.alerts);
  return Array.isArray(kept) && kept.length > 0;
}

/** Whether a sign-out would lose something that the clinic has not got. */
export const hasUnsent = (me: Me): boolean =>
  hasWaitingAlerts(me) ||
  Object.values(keptNames.draft).some((name) => readFromDevice(storeOf(me), name) !== null);
