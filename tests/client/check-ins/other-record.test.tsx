import { screen, waitFor } from '@testing-library/react';
import { QueryClient } from '@tanstack/react-query';
import { beforeEach, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { PostAlert } from '#shared/check-ins/contract.ts';
import { openRecord } from '#src/app/other-record.ts';
import { keepChoice } from '#src/app/record-choice.ts';
import { armCalls, sessionQuery } from '#src/app/session.tsx';
import { alertOutboxOf } from '#src/features/check-ins/alert-outbox-of.ts';
import { hasUnsent, keptNames, recordsWithAlerts, storeOf } from '#src/features/check-ins/kept.ts';
import { keepOnDevice } from '#src/lib/device-store.ts';
import { ines, inesHerself, marta, wendell } from '../app/caring-people.ts';
import { lost, serve } from '../clinic/screen.tsx';
import { aDraft } from './drafts.ts';
import { arriveAsInes, press, showFlow, tick } from './flow-screen.tsx';

const alert: Omit<PostAlert, 'sentAt'> = {
  id: '0d6f3a51-7c0c-4a2b-9c53-1d3ad1a1e001',
  checkInId: 'a3c0a6f4-2f0f-4f0c-9d36-0a1f5ad7a111',
  answers: { danger: ['cold-hand'] },
  answeredAt: '2026-12-01T08:40:00.000Z',
  rulesVersion: 'shipped-1',
};
const receipt = (body: unknown) => ({
  ...(body as { id: string; checkInId: string }),
  receivedAt: '2026-12-01T08:41:00.000Z',
  seen: null,
});

/** Marta is signed in, and her tab is on the record of Ines. */
function martaForInes(): { me: Me; queryClient: QueryClient } {
  const me = marta([ines, wendell]);
  const queryClient = new QueryClient();
  queryClient.setQueryData(sessionQuery.queryKey, { me });
  keepChoice(me.personId, ines.id);
  armCalls(me);
  return { me, queryClient };
}

beforeEach(async () => {
  await arriveAsInes();
});

it('an alert about one person is sent as theirs, though the tab has gone over to another meanwhile', async () => {
  let online = false;
  const sent = serve({ 'POST /api/alerts': ({ body }) => (online ? receipt(body) : lost) });
  const { me, queryClient } = martaForInes();
  alertOutboxOf(me, ines.id, queryClient).add(alert, 0);
  await waitFor(() => expect(sent).toHaveLength(1));
  openRecord(queryClient, me, wendell.id);
  online = true;
  window.dispatchEvent(new Event('online'));
  await waitFor(() => expect(recordsWithAlerts(me)).toEqual([]));
  expect(new Set(sent.map(({ record }) => record))).toEqual(new Set([ines.id]));
});

it('an alert of a caregiver who is a patient too is never sent as their own, nor their own as somebody else’s', async () => {
  const sent = serve({ 'POST /api/alerts': ({ body }) => receipt(body) });
  const me: Me = { ...inesHerself(), caresFor: [wendell] };
  const queryClient = new QueryClient();
  queryClient.setQueryData(sessionQuery.queryKey, { me });
  openRecord(queryClient, me, wendell.id);
  alertOutboxOf(me, null, queryClient).add(alert, 0);
  alertOutboxOf(me, wendell.id, queryClient).add({ ...alert, id: 'another' }, 0);
  await waitFor(() => expect(recordsWithAlerts(me)).toEqual([]));
  expect(sent.map(({ body, record }) => [(body as { id: string }).id, record])).toEqual([
    [alert.id, undefined],
    ['another', wendell.id],
  ]);
});

it('what an earlier visit left unsent is known for every record, and a sign-out asks about each', () => {
  const { me } = martaForInes();
  expect(hasUnsent(me)).toBe(false);
  keepOnDevice(storeOf(me, wendell.id), keptNames.alerts, [{ alert, tickedAtMs: 0 }]);
  keepOnDevice(storeOf(me, ines.id), keptNames.draft.full, { date: '2026-12-01' });
  expect(recordsWithAlerts(me)).toEqual([wendell.id]);
  expect(hasUnsent(me)).toBe(true);
});

it('a check-in that was begun for one person is sent as theirs, its alert too, and kept under their name', async () => {
  const sent = serve({
    'POST /api/alerts': ({ body }) => receipt(body),
    'POST /api/check-ins': ({ body }) => ({
      id: (body as { id: string }).id,
      receivedAt: '2026-12-01T08:41:00.000Z',
      localDate: '2026-12-01',
      clockDoubtful: false,
    }),
  });
  const { me } = martaForInes();
  const reviewed = {
    painNow: 3,
    painWorst: 4,
    swelling: 'same',
    dangerNone: true,
    symptomsNone: true,
  } as const;
  await showFlow(me, aDraft({ answers: reviewed, at: 'review' }));
  // Another tab's choice, or a slip of ours: the calls are about somebody else by now.
  openRecord(new QueryClient(), { ...me, personId: 'in-another-way' }, wendell.id);
  await press('Send');
  await screen.findByRole('heading', { level: 1 });
  await waitFor(() => expect(sent.map(({ path }) => path)).toContain('/api/check-ins'));
  expect(sent.map(({ record }) => record)).toEqual([ines.id]);
});

it('the answers of a check-in for somebody are kept apart from one’s own', async () => {
  serve({ 'POST /api/alerts': () => lost });
  const { me } = martaForInes();
  await showFlow(me, aDraft({ at: 'danger' }));
  await tick('Hand cold, pale or blue');
  const keys = Object.keys(sessionStorage).filter((key) => key.startsWith('espalier-data:'));
  expect(keys.sort()).toEqual(
    ['alerts', 'check-in'].map((name) => `espalier-data:${me.personId}:for:${ines.id}:${name}`),
  );
});
