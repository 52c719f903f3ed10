import { Phone } from 'lucide-react';
import type { ReactNode } from 'react';

type Props = {
  /** Name of the landmark. */
  label: string;
  /** A `tel:` address. */
  href: string;
  children: ReactNode;
};

/** One line that is a call link as a whole, so that it can be hit without looking. */
export function EmergencyLine({ label, href, children }: Props) {
  return (
    <aside aria-label={label} className="bg-clay-wash print:hidden">
      <a
        href={href}
        className="mx-auto flex min-h-11 max-w-3xl items-center gap-2.5 px-5 py-2 text-[0.9375rem] leading-snug font-bold text-clay -outline-offset-3"
      >
        <Phone className="size-5 shrink-0" aria-hidden />
        <span className="min-w-0">{children}</span>
      </a>
    </aside>
  );
}
