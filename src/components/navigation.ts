import type { LucideIcon } from 'lucide-react';

export type NavigationItem = {
  to: string;
  label: string;
  icon: LucideIcon;
  /** Active at this very address only, not at those below it. */
  end?: boolean;
  /** Other addresses that belong to the place, and those below them. */
  others?: readonly string[];
  /** Things waiting there; the label says of what, for those who hear the number. */
  badge?: { count: number; label: string };
};
