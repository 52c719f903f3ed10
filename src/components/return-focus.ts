import { useRef } from 'react';

/**
 * Gives the focus back to where it was before a dialog opened. Radix does so only for a dialog with a trigger of
 * its own; ours are opened by state, from a key, a clock or an answer of the server.
 */
export function useReturnFocus() {
  const before = useRef<HTMLElement | null>(null);
  return {
    onOpenAutoFocus: () => {
      before.current = document.activeElement instanceof HTMLElement ? document.activeElement : null;
    },
    onCloseAutoFocus: (event: Event) => {
      event.preventDefault();
      before.current?.focus();
    },
  };
}
