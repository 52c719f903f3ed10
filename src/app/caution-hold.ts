import { useEffect, useSyncExternalStore } from 'react';
import { createSignal } from '#src/lib/signal.ts';

let holds = 0;
const changed = createSignal<void>();

/**
 * While a caution is on the screen, the end of the session does not take it away: whoever is told to call an
 * ambulance must not find a sign-in form in its place. Nothing else of the person's data stays.
 */
export function useHoldScreen(active: boolean): void {
  useEffect(() => {
    if (!active) return undefined;
    holds += 1;
    changed.emit();
    return () => {
      holds -= 1;
      changed.emit();
    };
  }, [active]);
}

export const useIsScreenHeld = (): boolean => useSyncExternalStore(changed.subscribe, () => holds > 0);
