import type { Me } from '#shared/accounts/contract.ts';
import { readFromDevice, recordsKept } from '#src/lib/device-store.ts';

/** The names under which a check-in's parts are kept on the device. */
export const keptNames = {
  draft: { full: 'check-in', 'something-new': 'something-new' },
  alerts: 'alerts',
} as const;

const draftNames = Object.values(keptNames.draft);

/**
 * Whose storage it is, about which record (null: one's own), and whether it may outlive the tab: only where the
 * person chose to stay signed in.
 */
export const storeOf = ({ personId, session }: Me, recordId: string | null) => ({
  personId,
  recordId,
  onDevice: session.idleEndsAt === null,
});

/** Whether a draft of this kind is under way for this date. Cheap: Today asks without the check-in's code. */
export function hasDraft(
  me: Me,
  recordId: string | null,
  mode: keyof typeof keptNames.draft,
  date: string,
): boolean {
  const kept = readFromDevice(storeOf(me, recordId), keptNames.draft[mode]);
  return typeof kept === 'object' && kept !== null && 'date' in kept && kept.date === date;
}

/** The records about which an alert still waits to be sent, whichever one is on the screen. */
export const recordsWithAlerts = (me: Me): (string | null)[] =>
  recordsKept(storeOf(me, null), [keptNames.alerts]);

/** Whether a sign-out would lose something that the clinic has not got, about any record. */
export const hasUnsent = (me: Me): boolean =>
  recordsKept(storeOf(me, null), [keptNames.alerts, ...draftNames]).length > 0;
