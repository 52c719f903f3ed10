import { useSyncExternalStore } from 'react';
import { createSignal } from '#src/lib/signal.ts';
import { useMe } from './session.tsx';

export type Side = 'left' | 'right';

const changed = createSignal<void>();
const keyOf = (personId: string): string => `espalier-controls:${personId}`;

function chosenSide(personId: string): Side | null {
  try {
    const side = localStorage.getItem(keyOf(personId));
    return side === 'left' || side === 'right' ? side : null;
  } catch {
    // Without storage the side of the free hand holds.
    return null;
  }
}

/** Kept on this device for this person; it overrides the side that follows from the operated arm. */
export function chooseSide(personId: string, side: Side): void {
  try {
    localStorage.setItem(keyOf(personId), side);
  } catch {
    // Without storage the choice cannot be kept, and the side of the free hand holds.
  }
  changed.emit();
}

/** The side towards which the main control and those that repeat stand. */
export function useControlsSide(): Side {
  const { personId, patient } = useMe();
  const chosen = useSyncExternalStore(changed.subscribe, () => chosenSide(personId));
  return chosen ?? patient?.controlsTowards ?? 'right';
}
