import type { ReactNode } from 'react';

/** A key of the keyboard. */
export function Kbd({ children }: { children: ReactNode }) {
  return (
    <kbd className="inline-grid h-5 min-w-5 place-items-center rounded-sm border border-b-2 border-wire-strong bg-sheet px-1 font-sans text-[0.6875rem] font-bold text-ink">
      {children}
    </kbd>
  );
}
