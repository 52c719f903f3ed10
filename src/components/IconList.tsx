import type { LucideIcon } from 'lucide-react';
import type { ReactNode } from 'react';

export type IconListItem = {
  key: string;
  icon: LucideIcon;
  title: ReactNode;
  detail?: ReactNode;
  /** A control at the end of the row. */
  action?: ReactNode;
};

/** Rows with a picture, a bold line and a softer one, parted by hairlines. */
export function IconList({ items }: { items: IconListItem[] }) {
  return (
    <ul>
      {items.map((item) => (
        <li key={item.key} className="flex gap-3.5 border-b border-wire py-3.5 last:border-b-0">
          <item.icon className="size-7 shrink-0 text-bark" strokeWidth={1.75} aria-hidden />
          <div className="min-w-0 grow leading-snug">
            <div className="font-bold">{item.title}</div>
            {item.detail ? <div className="mt-1 text-sm text-ink-soft">{item.detail}</div> : null}
          </div>
          {item.action}
        </li>
      ))}
    </ul>
  );
}
