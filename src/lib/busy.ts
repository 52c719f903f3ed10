import { useEffect, useSyncExternalStore } from 'react';
import { createSignal } from './signal.ts';

let busyCount = 0;
const changed = createSignal<void>();

/** Marks this tab as being in the middle of something until the returned function is called. */
function beginBusy(): () => void {
  busyCount += 1;
  changed.emit();
  let over = false;
  return () => {
    if (over) return;
    over = true;
    busyCount -= 1;
    changed.emit();
  };
}

/** While `active`, nothing may ask the person to reload: a check-in under way, a text that is not sent. */
export function useBusyWhile(active: boolean): void {
  useEffect(() => (active ? beginBusy() : undefined), [active]);
}

/** Whether anything in this tab is under way. */
export const useIsBusy = (): boolean => useSyncExternalStore(changed.subscribe, () => busyCount > 0);
