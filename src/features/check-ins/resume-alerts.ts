import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useMe } from '#src/app/session.tsx';
import { recordsWithAlerts } from './kept.ts';

/** Goes on sending what an earlier visit of the same person left unsent, about every record. */
export function useResumedAlerts(): void {
  const me = useMe();
  const queryClient = useQueryClient();
  useEffect(() => {
    const waiting = recordsWithAlerts(me);
    if (waiting.length === 0) return undefined;
    let stopped = false;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const resume = () => {
      import('./alert-outbox-of.ts').then(
        ({ alertOutboxOf }) => {
          if (!stopped) waiting.forEach((recordId) => alertOutboxOf(me, recordId, queryClient).start());
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
