import { NavLink } from 'react-router-dom';
import { Badge } from '#src/components/Badge.tsx';
import { classNames } from '#src/components/class-names.ts';
import type { NavigationItem } from '#src/components/navigation.ts';

type Props = { label: string; items: NavigationItem[] };

/** The same places as the bar at the foot, beside the page where there is room for them. */
export function SideNavigation({ label, items }: Props) {
  return (
    <nav aria-label={label} className="hidden px-3 pt-4 lg:block print:hidden">
      <ul className="sticky top-4 grid gap-1">
        {items.map((item) => (
          <li key={item.to}>
            <NavLink
              to={item.to}
              end={item.end}
              className={({ isActive }) =>
                classNames(
                  'flex min-h-target items-center gap-3 rounded px-3 py-1.5 font-bold',
                  isActive
                    ? 'bg-leaf-wash text-leaf-deep'
                    : 'text-ink-soft hover:bg-bark-wash hover:text-ink',
                )
              }
            >
              <item.icon className="size-6 shrink-0" aria-hidden />
              <span className="min-w-0 grow">{item.label}</span>
              {item.badge ? <Badge {...item.badge} /> : null}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
