import { useQueryClient } from '@tanstack/react-query';
import { lazy, Suspense, useEffect } from 'react';
import type { Me } from '#shared/accounts/contract.ts';
import { sessionDoubted } from '#src/lib/api.ts';
import { connectHints } from '#src/lib/socket.ts';
import { endSession, sessionQuery } from './session.tsx';
import { listenToOtherTabs } from './tabs.ts';
import { useIdleClock } from './idle-clock.ts';

const IdleDialog = lazy(async () => ({ default: (await import('./IdleDialog.tsx')).IdleDialog }));

/** Leaves no trace of whoever was here: the page begins anew as whoever is signed in now. */
const startOver = () => window.location.replace('/');

/** Watches over one person's session in this tab: its hints, its end, its idle clock, the other tabs. */
export function SessionGuard({ me }: { me: Me }) {
  const queryClient = useQueryClient();
  const { personId } = me;

  useEffect(
    () => connectHints(queryClient, () => endSession(queryClient, 'ended')),
    // A new sign-in has a session of its own, and so needs a socket of its own.
    [queryClient, me.writeToken],
  );

  useEffect(
    () =>
      listenToOtherTabs((news) => {
        if (news.kind === 'signed-out') endSession(queryClient, 'signed-out-elsewhere');
        else if (news.personId !== personId) startOver();
        else void queryClient.refetchQueries(sessionQuery);
      }),
    [queryClient, personId],
  );

  useEffect(
    () =>
      sessionDoubted.subscribe((doubt) => {
        if (doubt === 'not-signed-in') endSession(queryClient, 'ended');
        else void queryClient.refetchQueries(sessionQuery);
      }),
    [queryClient],
  );

  useEffect(
    () =>
      queryClient.getQueryCache().subscribe(() => {
        const now = queryClient.getQueryData(sessionQuery.queryKey)?.me;
        if (now && now.personId !== personId) startOver();
      }),
    [queryClient, personId],
  );

  const idle = useIdleClock(me.session.idleEndsAt);
  return idle.warning ? (
    <Suspense>
      <IdleDialog endsAtMs={idle.endsAtMs} onStay={idle.stay} />
    </Suspense>
  ) : null;
}
