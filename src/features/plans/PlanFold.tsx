import { ChevronDown } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import { useEffect, useRef } from 'react';
import type { ReactNode } from 'react';

type Props = { icon: LucideIcon; title: string; children: ReactNode };

/** A list of the plan under one line that opens it. It is open on paper. */
export function PlanFold({ icon: Icon, title, children }: Props) {
  const fold = useRef<HTMLDetailsElement>(null);
  useEffect(() => {
    const open = () => {
      if (fold.current) fold.current.open = true;
    };
    window.addEventListener('beforeprint', open);
    return () => window.removeEventListener('beforeprint', open);
  }, []);
  return (
    <details ref={fold} className="group border-b border-wire last:border-b-0">
      <summary className="flex min-h-target cursor-pointer list-none items-center gap-3 rounded py-2 font-bold hover:bg-leaf-wash [&::-webkit-details-marker]:hidden">
        <Icon className="size-7 shrink-0 text-bark" strokeWidth={1.75} aria-hidden />
        <span className="min-w-0 grow">{title}</span>
        <ChevronDown
          className="size-6 shrink-0 group-open:rotate-180 motion-safe:transition-transform print:hidden"
          aria-hidden
        />
      </summary>
      <div className="pb-2">{children}</div>
    </details>
  );
}
