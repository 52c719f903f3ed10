import { useQueryClient } from '@tanstack/react-query';
import { lazy, Suspense, useEffect } from 'react';
import type { Me } from '#shared/accounts/contract.ts';
import { sessionDoubted } from '#src/lib/api.ts';
import { clearDeviceStore } from '#src/lib/device-store.ts';
import { loadWords } from '#src/lib/i18n.ts';
import { connectHints } from '#src/lib/socket.ts';
import { ProofHost } from './proof.tsx';
import { endSession, sessionQuery } from './session.tsx';
import { dropForeignPush } from './push-of-others.ts';
import { listenToOtherTabs } from './tabs.ts';
import { useIdleClock } from './idle-clock.ts';

const IdleDialog = lazy(async () => {
  const [module] = await Promise.all([import('./IdleDialog.tsx'), loadWords(['leaving'])]);
  return { default: module.IdleDialog };
});

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
        if (news.kind === 'signed-out') {
          // What this tab kept for itself is out of the reach of the one that signed out.
          clearDeviceStore();
          endSession(queryClient, 'signed-out-elsewhere');
        } else if (news.personId !== personId) startOver();
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

  useEffect(() => {
    // What could not be settled, as happens off line, is settled at the next start of a page.
    dropForeignPush(personId).catch(() => undefined);
  }, [personId, me.writeToken]);

  const idle = useIdleClock(me.session.idleEndsAt);
  return (
    <>
      <ProofHost />
      {idle.warning ? (
        <Suspense>
          <IdleDialog endsAtMs={idle.endsAtMs} stayFailed={idle.stayFailed} onStay={idle.stay} />
        </Suspense>
      ) : null}
    </>
  );
}
