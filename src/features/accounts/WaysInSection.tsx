import { useId } from 'react';
import type { ReactNode } from 'react';
import { SectionHeading } from '#src/components/SectionHeading.tsx';

/** One kind of way in, under its own heading. */
export function WaysInSection({ title, children }: { title: string; children: ReactNode }) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHeading id={id} wire>
        {title}
      </SectionHeading>
      {children}
    </section>
  );
}
