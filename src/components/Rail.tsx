import { Menu } from 'lucide-react';
import { useId, useState } from 'react';
import type { ReactNode } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { Badge } from './Badge.tsx';
import { classNames } from './class-names.ts';
import type { NavigationItem } from './navigation.ts';

type Props = {
  label: string;
  /** The name of the button that opens the places where the rail is folded (narrow or zoomed screens). */
  menuLabel: string;
  items: NavigationItem[];
  /** The name of the product, with its link home. */
  head: ReactNode;
  /** What stands at the foot: who is on duty, the account. */
  foot?: ReactNode;
};

const isBelow = (place: string, pathname: string): boolean =>
  pathname === place || pathname.startsWith(place === '/' ? place : `${place}/`);

function isOpen({ to, end, others = [] }: NavigationItem, pathname: string): boolean {
  return end ? pathname === to : [to, ...others].some((place) => isBelow(place, pathname));
}

/** The places of a large screen, down its left side; folded under one button where there is no room beside. */
export function Rail({ label, menuLabel, items, head, foot }: Props) {
  const [open, setOpen] = useState(false);
  const foldId = useId();
  const { pathname } = useLocation();
  return (
    <header className="flex flex-col border-b border-wire bg-paper px-3 py-2 lg:sticky lg:top-0 lg:h-dvh lg:w-54 lg:shrink-0 lg:overflow-y-auto lg:border-r lg:border-b-0 lg:py-5 print:hidden">
      <div className="flex flex-wrap items-center justify-between gap-x-3 px-2 lg:mb-4">
        {head}
        <button
          type="button"
          aria-expanded={open}
          aria-controls={foldId}
          onClick={() => setOpen(!open)}
          className="inline-flex min-h-target items-center gap-2 rounded border border-wire-strong px-3 font-bold lg:hidden"
        >
          <Menu className="size-5" aria-hidden />
          {menuLabel}
        </button>
      </div>
      <div id={foldId} className={classNames('grow flex-col lg:flex', open ? 'flex' : 'hidden')}>
        <nav aria-label={label}>
          <ul className="grid gap-0.5 py-2 lg:py-0">
            {items.map((item) => (
              <li key={item.to}>
                <Link
                  to={item.to}
                  aria-current={isOpen(item, pathname) ? 'page' : undefined}
                  onClick={() => setOpen(false)}
                  className={classNames(
                    'flex min-h-target items-center gap-2.5 rounded px-2.5 py-1.5 text-[0.9375rem] font-bold',
                    isOpen(item, pathname)
                      ? 'bg-leaf-wash text-leaf-deep'
                      : 'text-ink-soft hover:bg-bark-wash hover:text-ink',
                  )}
                >
                  <item.icon className="size-5 shrink-0" aria-hidden />
                  <span className="min-w-0 grow">{item.label}</span>
                  {item.badge ? <Badge {...item.badge} /> : null}
                </Link>
              </li>
            ))}
          </ul>
        </nav>
        {foot ? <div className="mt-auto px-2 pt-4 pb-1 text-sm text-ink-soft">{foot}</div> : null}
      </div>
    </header>
  );
}
