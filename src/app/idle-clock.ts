import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { noteActivity } from '#shared/accounts/contract.ts';
import { call } from '#src/lib/api.ts';
import { serverNow } from '#src/lib/server-clock.ts';
import { endSession, sessionQuery } from './session.tsx';

/** Activity is told to the server at most this often. */
const tellEveryMs = 60_000;
const warnBeforeMs = 60_000;

type IdleClock = {
  /** The end is near, and only the dialog's button keeps the session. */
  warning: boolean;
  endsAtMs: number;
  stay: () => void;
  /** It was asked to stay, and nothing answered. */
  stayFailed: boolean;
};

/**
 * Tells the server of what a person does, warns before the session ends for want of it, and ends it here.
 * Null where the person chose to stay signed in: then there is no idle clock.
 */
export function useIdleClock(idleEndsAt: string | null): IdleClock {
  const queryClient = useQueryClient();
  const endsAtMs = idleEndsAt === null ? Infinity : Date.parse(idleEndsAt);
  const [warnedFor, setWarnedFor] = useState<number | null>(null);
  const warning = warnedFor === endsAtMs;
  const lastToldMs = useRef(-Infinity);

  const { mutate: tell, isError: stayFailed } = useMutation({
    mutationFn: () => call<typeof noteActivity>('post', '/api/session/activity', {}),
    onMutate: () => {
      lastToldMs.current = Date.now();
    },
    onSuccess: (times) =>
      queryClient.setQueryData(sessionQuery.queryKey, (old) =>
        old?.me ? { me: { ...old.me, session: times } } : old,
      ),
    // A failure needs no word: the next key or touch tells again, and the warning comes in time.
    onError: () => {
      lastToldMs.current = -Infinity;
    },
  });

  useEffect(() => {
    if (endsAtMs === Infinity || warning) return undefined;
    const onInput = (event: Event) => {
      if (event.isTrusted && Date.now() - lastToldMs.current >= tellEveryMs) tell();
    };
    window.addEventListener('pointerdown', onInput, { passive: true });
    window.addEventListener('keydown', onInput);
    return () => {
      window.removeEventListener('pointerdown', onInput);
      window.removeEventListener('keydown', onInput);
    };
  }, [endsAtMs, warning, tell]);

  useEffect(() => {
    if (endsAtMs === Infinity) return undefined;
    let timer: ReturnType<typeof setTimeout> | undefined;
    async function look() {
      clearTimeout(timer);
      const leftMs = endsAtMs - serverNow();
      if (leftMs > warnBeforeMs) {
        timer = setTimeout(() => void look(), leftMs - warnBeforeMs);
        return;
      }
      // Another tab may have kept the session alive: the server knows. Asking does not count as activity.
      await queryClient.refetchQueries(sessionQuery);
      const me = queryClient.getQueryData(sessionQuery.queryKey)?.me;
      const renewed = me?.session.idleEndsAt !== undefined && me.session.idleEndsAt !== idleEndsAt;
      if (renewed) return;
      const stillLeftMs = endsAtMs - serverNow();
      if (stillLeftMs <= 0 || !me) {
        endSession(queryClient, 'idle');
        return;
      }
      setWarnedFor(endsAtMs);
      timer = setTimeout(() => void look(), stillLeftMs);
    }
    void look();
    // Timers sleep with the device: whoever opens the lid is asked at once.
    const onVisible = () => {
      if (document.visibilityState === 'visible') void look();
    };
    document.addEventListener('visibilitychange', onVisible);
    return () => {
      clearTimeout(timer);
      document.removeEventListener('visibilitychange', onVisible);
    };
  }, [queryClient, idleEndsAt, endsAtMs]);

  const stay = useCallback(() => tell(), [tell]);
  return { warning, endsAtMs, stay, stayFailed };
}
