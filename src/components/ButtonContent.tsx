import type { LucideIcon } from 'lucide-react';
import type { ReactNode } from 'react';

type Props = { icon?: LucideIcon; iconAfter?: LucideIcon; children: ReactNode };

/** Icon, words, icon: the inside of a button and of a link that looks like one. */
export function ButtonContent({ icon: Icon, iconAfter: IconAfter, children }: Props) {
  return (
    <span className="flex min-w-0 items-center justify-center gap-[0.6em] text-center leading-snug">
      {Icon ? <Icon className="size-[1.25em] shrink-0" aria-hidden /> : null}
      <span className="min-w-0">{children}</span>
      {IconAfter ? <IconAfter className="size-[1.25em] shrink-0" aria-hidden /> : null}
    </span>
  );
}
