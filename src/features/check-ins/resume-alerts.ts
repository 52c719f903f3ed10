import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useMe } from '#src/app/session.tsx';
import { hasWaitingAlerts } from './kept.ts';

/** Goes on sending what an earlier visit of the same person left unsent. */
export function useResumedAlerts(): void {
  const me = useMe();
  const queryClient = useQueryClient();
  useEffect(() => {
    if (!hasWaitingAlerts(me)) return undefined;
    let stopped = false;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const resume = () => {
      import('./alert-outbox-of.ts').then(
        ({ alertOutboxOf }) => {
          if (!stopped) alertOutboxOf(me, queryClient).start();
        },
        // Off line the code itself may be missing; what waits is kept, and is taken up as soon as it comes.
        () => {
          if (!stopped) timer = setTimeout(resume, 5_000);
        },
      );
    };
    resume();
    return () => {
      stopped = true;
      clearTimeout(timer);
    };
  }, [me, queryClient]);
}
