import type { QueryClient } from '@tanstack/react-query';
import type { Me } from '#shared/accounts/contract.ts';
import type { postAlert, postMistake } from '#shared/check-ins/contract.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { call } from '#src/lib/api.ts';
import { dropFromDevice, keepOnDevice, readFromDevice } from '#src/lib/device-store.ts';
import { createAlertOutbox } from './alert-outbox.ts';
import type { AlertOutbox, OutgoingAlert } from './alert-outbox.ts';
import { keptNames, storeOf } from './kept.ts';

let current: { personId: string; outbox: AlertOutbox } | null = null;

const isOutgoing = (entry: unknown): entry is OutgoingAlert =>
  typeof entry === 'object' && entry !== null && 'alert' in entry && 'tickedAtMs' in entry;

/**
 * The one outbox of this tab for this person. It goes on sending after the check-in was left, and takes up what
 * an earlier visit left unsent.
 */
export function alertOutboxOf(me: Me, queryClient: QueryClient): AlertOutbox {
  const { personId } = me;
  if (current?.personId === personId) return current.outbox;
  const store = storeOf(me);
  const outbox = createAlertOutbox({
    postAlert: (body) => call<typeof postAlert>('post', '/api/alerts', { body }),
    postMistake: (alertId, body) =>
      call<typeof postMistake>('post', '/api/alerts/:alertId/mistakes', { params: { alertId }, body }),
    isSignedIn: () => queryClient.getQueryData(sessionQuery.queryKey)?.me?.personId === personId,
    read: () => {
      const kept = readFromDevice(store, keptNames.alerts);
      return Array.isArray(kept) ? kept.filter(isOutgoing) : [];
    },
    keep: (waiting) =>
      waiting.length > 0
        ? keepOnDevice(store, keptNames.alerts, waiting)
        : dropFromDevice(personId, keptNames.alerts),
  });
  current = { personId, outbox };
  window.addEventListener('online', () => outbox.start());
  return outbox;
}
