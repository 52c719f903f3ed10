import type { QueryClient } from '@tanstack/react-query';
import type { Me } from '#shared/accounts/contract.ts';
import type { postAlert, postMistake } from '#shared/check-ins/contract.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { call } from '#src/lib/api.ts';
import { dropFromDevice, keepOnDevice, readFromDevice } from '#src/lib/device-store.ts';
import { createAlertOutbox } from './alert-outbox.ts';
import type { AlertOutbox, OutgoingAlert } from './alert-outbox.ts';
import { keptNames, storeOf } from './kept.ts';

type Outboxes = { personId: string; byRecord: Map<string | null, AlertOutbox> };

let current: Outboxes | null = null;

const isOutgoing = (entry: unknown): entry is OutgoingAlert =>
  typeof entry === 'object' && entry !== null && 'alert' in entry && 'tickedAtMs' in entry;

/**
 * The one outbox of this tab for this person and this record. It goes on sending after the check-in was left,
 * and takes up what an earlier visit left unsent. What is in it is about its own record, whichever one the tab
 * is on when it goes out.
 */
export function alertOutboxOf(me: Me, recordId: string | null, queryClient: QueryClient): AlertOutbox {
  const { byRecord } = outboxesOf(me.personId);
  const known = byRecord.get(recordId);
  if (known) return known;
  const outbox = createOutbox(me, recordId, queryClient);
  byRecord.set(recordId, outbox);
  window.addEventListener('online', () => outbox.start());
  return outbox;
}

function outboxesOf(personId: string): Outboxes {
  if (current?.personId !== personId) current = { personId, byRecord: new Map() };
  return current;
}

function createOutbox(me: Me, recordId: string | null, queryClient: QueryClient): AlertOutbox {
  const store = storeOf(me, recordId);
  return createAlertOutbox({
    postAlert: (body) => call<typeof postAlert>('post', '/api/alerts', { body }, { record: recordId }),
    postMistake: (alertId, body) =>
      call<typeof postMistake>(
        'post',
        '/api/alerts/:alertId/mistakes',
        { params: { alertId }, body },
        { record: recordId },
      ),
    isSignedIn: () => queryClient.getQueryData(sessionQuery.queryKey)?.me?.personId === me.personId,
    read: () => {
      const kept = readFromDevice(store, keptNames.alerts);
      return Array.isArray(kept) ? kept.filter(isOutgoing) : [];
    },
    keep: (waiting) =>
      waiting.length > 0
        ? keepOnDevice(store, keptNames.alerts, waiting)
        : dropFromDevice(store, keptNames.alerts),
  });
}
