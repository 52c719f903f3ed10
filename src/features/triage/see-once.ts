import { useEffect, useEffectEvent, useRef } from 'react';
import { useSeeFlag } from './queries.ts';

/**
 * Records once that this clinician has the case on the screen; the patient is told so. A tab in the background
 * has nobody before it, so there it waits until the tab is shown.
 */
export function useSeeOnce(flagId: string, onScreen: boolean): void {
  const { mutate } = useSeeFlag(flagId);
  const recorded = useRef<string | null>(null);
  const record = useEffectEvent(() => {
    if (recorded.current === flagId || document.visibilityState !== 'visible') return;
    recorded.current = flagId;
    mutate();
  });
  useEffect(() => {
    if (!onScreen) return undefined;
    record();
    document.addEventListener('visibilitychange', record);
    return () => document.removeEventListener('visibilitychange', record);
  }, [onScreen, flagId]);
}
