import { useEffect, useEffectEvent, useRef } from 'react';
import type { FlagCase } from '#shared/triage/contract.ts';
import { useSeeFlag } from './queries.ts';

/**
 * Records that this clinician has the case on the screen; the patient is told so. Once for each time that the
 * flag was raised: who saw the fall has not seen the chest pain that came after it. A tab in the background has
 * nobody before it, so there it waits until the tab is shown.
 */
export function useSeeOnce({ id: flagId, events }: Pick<FlagCase, 'id' | 'events'>, onScreen: boolean): void {
  const { mutate } = useSeeFlag(flagId);
  const raising = events.findLast(({ kind }) => kind === 'raised' || kind === 'raised-again');
  const toSee = `${flagId}/${raising?.id ?? ''}`;
  const recorded = useRef<string | null>(null);
  const record = useEffectEvent(() => {
    if (recorded.current === toSee || document.visibilityState !== 'visible') return;
    recorded.current = toSee;
    mutate();
  });
  useEffect(() => {
    if (!onScreen) return undefined;
    record();
    document.addEventListener('visibilitychange', record);
    return () => document.removeEventListener('visibilitychange', record);
  }, [onScreen, toSee]);
}
