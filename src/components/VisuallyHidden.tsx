import type { ReactNode } from 'react';

/** Text for those who hear the screen. */
export function VisuallyHidden({ children }: { children: ReactNode }) {
  return <span className="sr-only">{children}</span>;
}
