import { NavLink } from 'react-router-dom';
import { Badge } from './Badge.tsx';
import { classNames } from './class-names.ts';
import type { NavigationItem } from './navigation.ts';

type Props = { label: string; items: NavigationItem[] };

/** The places of a small screen. Items wrap into a second row rather than cut their words. */
export function BottomBar({ label, items }: Props) {
  return (
    <nav aria-label={label} className="border-t border-wire bg-sheet print:hidden">
      <ul className="mx-auto flex max-w-3xl flex-wrap justify-center">
        {items.map((item) => (
          <li key={item.to} className="grid min-w-[25%] grow">
            <NavLink
              to={item.to}
              end={item.end}
              className={({ isActive }) =>
                classNames(
                  'relative grid min-h-16 content-center justify-items-center gap-1 px-1.5 py-2 text-[0.8125rem] leading-tight -outline-offset-3',
                  isActive ? 'font-black text-leaf' : 'text-ink-soft hover:text-ink',
                )
              }
            >
              <span className="relative">
                <item.icon className="size-6" aria-hidden />
                {item.badge && item.badge.count > 0 ? (
                  <span className="absolute -top-1.5 left-4">
                    <Badge {...item.badge} />
                  </span>
                ) : null}
              </span>
              {item.label}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
