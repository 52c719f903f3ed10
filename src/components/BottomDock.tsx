import type { ReactNode } from 'react';

/**
 * Keeps what it holds at the foot of the screen. On a screen too short to spare the room (small phone held
 * sideways, large zoom) it stays in the flow of the page instead, so that it never covers what is read.
 */
export function BottomDock({ children }: { children: ReactNode }) {
  return (
    <div
      data-dock="foot"
      className="z-10 mt-auto bg-sheet pb-[env(safe-area-inset-bottom)] [@media(min-height:34em)]:sticky [@media(min-height:34em)]:bottom-0 print:hidden"
    >
      {children}
    </div>
  );
}
