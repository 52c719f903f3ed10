import { NavLink } from 'react-router-dom';
import { may } from '#shared/access/permissions.ts';
import type { Role } from '#shared/access/permissions.ts';
import { classNames } from '#src/components/class-names.ts';
import { clinicPlaces } from './clinic-places.ts';

/** The places inside Clinic, where a person may use more than one of them. */
export function ClinicTabs({ roles }: { roles: readonly Role[] }) {
  const places = clinicPlaces.filter(({ permission }) => may(roles, permission));
  if (places.length < 2) return null;
  return (
    <nav aria-label="Clinic">
      <ul className="flex flex-wrap gap-1">
        {places.map(({ to, label }) => (
          <li key={to}>
            <NavLink
              to={to}
              className={({ isActive }) =>
                classNames(
                  'inline-flex min-h-target items-center rounded px-3 py-1.5 font-bold',
                  isActive
                    ? 'bg-leaf-wash text-leaf-deep'
                    : 'text-ink-soft hover:bg-bark-wash hover:text-ink',
                )
              }
            >
              {label}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
