import { EllipsisVertical, Mail, Printer, Smartphone } from 'lucide-react';
import { useNavigate } from 'react-router-dom';
import type { PatientLine } from '#shared/patients/contract.ts';
import { DropdownMenu } from '#src/components/DropdownMenu.tsx';
import { IconButton } from '#src/components/IconButton.tsx';
import { useToast } from '#src/components/Toast.tsx';
import { isOpenInvitation } from '#src/lib/invitation-words.ts';
import { refusalOf } from '#src/lib/refusal.ts';
import { letterPlace, phonePlace } from './patient-places.ts';
import { useReinvitePatient } from './queries.ts';

type Props = { patient: PatientLine; nowMs: number };

/** The invitation of a patient from the list. A new one opens in place of the old. */
export function PatientRowMenu({ patient, nowMs }: Props) {
  const navigate = useNavigate();
  const show = useToast();
  const reinvite = useReinvitePatient();
  const { id: patientId, name, invitation } = patient;

  function invite(byEmail: boolean) {
    reinvite.mutate(
      { patientId, byEmail },
      {
        onSuccess: ({ id }) => {
          if (byEmail) show({ text: `A new invitation is on its way to ${name}.` });
          else void navigate(letterPlace(id));
        },
        onError: (error) =>
          show({ text: `${refusalOf(error).title} ${refusalOf(error).detail}`, shownMs: null }),
      },
    );
  }
  const open = isOpenInvitation(invitation, nowMs) ? invitation : null;
  return (
    <DropdownMenu
      head={`Invitation of ${name}`}
      trigger={<IconButton icon={EllipsisVertical} label={`Invitation of ${name}`} />}
      items={[
        ...(open
          ? [
              {
                key: 'letter',
                label: 'Print the letter',
                icon: Printer,
                onSelect: () => void navigate(letterPlace(open.id)),
              },
              {
                key: 'phone',
                label: 'Set up on their phone here',
                icon: Smartphone,
                onSelect: () => void navigate(phonePlace(open.id)),
              },
            ]
          : []),
        { key: 'email', label: 'Send a new one by e-mail', icon: Mail, onSelect: () => invite(true) },
        { key: 'new-letter', label: 'New letter', icon: Printer, onSelect: () => invite(false) },
      ]}
    />
  );
}
