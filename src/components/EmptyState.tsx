import type { LucideIcon } from 'lucide-react';
import type { ReactNode } from 'react';

type Props = {
  icon?: LucideIcon;
  title: string;
  /** Why it is empty and what would fill it. */
  children?: ReactNode;
  action?: ReactNode;
};

export function EmptyState({ icon: Icon, title, children, action }: Props) {
  return (
    <div className="grid justify-items-center gap-2 px-4 py-10 text-center">
      {Icon ? <Icon className="size-8 text-bark" strokeWidth={1.5} aria-hidden /> : null}
      <p className="text-lg font-bold">{title}</p>
      {children ? <div className="max-w-prose text-ink-soft">{children}</div> : null}
      {action ? <div className="mt-2">{action}</div> : null}
    </div>
  );
}
