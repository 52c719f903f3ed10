import { Bell, ChevronsUpDown, KeyRound, LogOut } from 'lucide-react';
import { useNavigate } from 'react-router-dom';
import type { Me } from '#shared/accounts/contract.ts';
import type { Role } from '#shared/access/permissions.ts';
import { Avatar } from '#src/components/Avatar.tsx';
import { DropdownMenu } from '#src/components/DropdownMenu.tsx';
import { useSignOut } from '../sign-out.ts';

const roleWords: Record<Role, string> = {
  patient: 'Patient',
  caregiver: 'Caregiver',
  therapist: 'Therapist',
  'on-call-clinician': 'Clinician on call',
  'clinical-lead': 'Clinical lead',
  administrator: 'Administrator',
  billing: 'Billing',
};

/** Who is signed in, in which role, and the way out. */
export function ClinicAccount({ me }: { me: Me }) {
  const signOut = useSignOut();
  const navigate = useNavigate();
  const role = me.roles.map((held) => roleWords[held]).join(', ');
  return (
    <div>
      <DropdownMenu
        head={`${me.name} · ${me.clinic.name}`}
        trigger={
          <button
            type="button"
            className="-mx-2 flex min-h-target w-[calc(100%+1rem)] items-center gap-2.5 rounded px-2 py-1.5 text-left hover:bg-bark-wash"
          >
            <Avatar name={me.name} decorative />
            <span className="min-w-0 grow leading-snug">
              <span className="block font-bold text-ink">{me.name}</span>
              <span className="block">{role}</span>
            </span>
            <ChevronsUpDown className="size-4 shrink-0" aria-hidden />
          </button>
        }
        items={[
          {
            key: 'sign-in',
            label: 'Sign-in and devices',
            icon: KeyRound,
            onSelect: () => void navigate('/clinic/account/sign-in'),
          },
          {
            key: 'notifications',
            label: 'Notifications',
            icon: Bell,
            onSelect: () => void navigate('/clinic/account/notifications'),
          },
          { key: 'sign-out', label: 'Sign out', icon: LogOut, onSelect: () => signOut.mutate() },
        ]}
      />
      <p role="alert" className="font-bold text-clay">
        {signOut.isError
          ? 'You are not signed out yet: the clinic’s server could not be reached. Try again.'
          : null}
      </p>
    </div>
  );
}
