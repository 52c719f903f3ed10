import { Printer, UserPlus } from 'lucide-react';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { ClinicCaregiverCard, PatientRecord } from '#shared/patients/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatDateAndYear, localDateOf } from '#src/lib/format.ts';
import { comingWords, isOpenInvitation } from '#src/lib/invitation-words.ts';
import { InviteCaregiverForm } from './InviteCaregiverForm.tsx';
import { letterPlace } from './patient-places.ts';
import { useEndCaregiver } from './queries.ts';

/** "May answer check-ins and write messages, until 3 Jan 2027." */
function limitWords({ mayCheckIn, mayMessage, until }: ClinicCaregiverCard): string {
  const acts = [mayCheckIn ? 'answer check-ins' : null, mayMessage ? 'write messages' : null].filter(
    (act) => act !== null,
  );
  const may = acts.length > 0 ? `May ${acts.join(' and ')}` : 'Sees the record only';
  return until === null ? `${may}.` : `${may}, until ${formatDateAndYear(until)}.`;
}

/** How far they have come. Who had a way in already was told by mail, and needs no invitation. */
function openingWords(card: ClinicCaregiverCard, nowMs: number, timeZone: string): string | null {
  const { invitation, firstOpenedAt, createdAt } = card;
  if (firstOpenedAt === null && invitation === null) {
    return `Told by e-mail ${formatDateAndYear(localDateOf(createdAt, timeZone))}, has not looked yet`;
  }
  return comingWords({ invitation, firstSignedInAt: firstOpenedAt }, nowMs, timeZone);
}

type Props = {
  record: PatientRecord;
  nowMs: number;
  timeZone: string;
  onDone: (words: string) => void;
};

/** Who may see the record besides the patient and the clinic, by whose leave, and how far. */
export function CaregiverSection({ record, nowMs, timeZone, onDone }: Props) {
  const navigate = useNavigate();
  const end = useEndCaregiver(record.id);
  const [inviting, setInviting] = useState(false);
  const [ending, setEnding] = useState<ClinicCaregiverCard | null>(null);
  const dateOf = (instant: string) => formatDateAndYear(localDateOf(instant, timeZone));
  return (
    <section aria-labelledby="caregivers-heading">
      <SectionHeading id="caregivers-heading" wire>
        Caregivers
      </SectionHeading>
      {record.caregivers.length === 0 ? <p className="text-ink-soft">Nobody besides the patient.</p> : null}
      <ul>
        {record.caregivers.map((card) => (
          <li key={card.id} className="border-b border-wire py-3 leading-snug last:border-b-0">
            <p className="font-bold wrap-anywhere">
              {card.name}
              <span className="font-normal text-ink-soft">, {card.relationship}</span>
            </p>
            {card.endedAt === null ? (
              <>
                <p>{limitWords(card)}</p>
                <p className="text-sm text-ink-soft wrap-anywhere">{card.email}</p>
              </>
            ) : (
              <p>Ended {dateOf(card.endedAt)}.</p>
            )}
            <p className="text-sm text-ink-soft">
              {card.byClinic ? `Let in by ${card.grantedBy} of the clinic` : 'Let in by the patient'},{' '}
              {dateOf(card.createdAt)}.{card.consent === null ? null : ` Consent: ${card.consent}`}
            </p>
            {card.endedAt === null ? (
              <>
                <p className="text-sm font-bold">{openingWords(card, nowMs, timeZone)}</p>
                <div className="mt-1 -ml-4 flex flex-wrap gap-x-2">
                  {isOpenInvitation(card.invitation, nowMs) && card.firstOpenedAt === null ? (
                    <LinkButton to={letterPlace(card.invitation.id)} variant="quiet" icon={Printer}>
                      Letter
                    </LinkButton>
                  ) : null}
                  <Button variant="quiet" onClick={() => setEnding(card)}>
                    End
                  </Button>
                </div>
              </>
            ) : null}
          </li>
        ))}
      </ul>
      {record.state === 'ended' ? null : (
        <div className="mt-3">
          <Button variant="outline" icon={UserPlus} onClick={() => setInviting(true)}>
            Invite a caregiver
          </Button>
        </div>
      )}
      {inviting ? (
        <InviteCaregiverForm
          patientId={record.id}
          patientName={record.name}
          onClose={() => setInviting(false)}
          onInvited={(card, byEmail) => {
            setInviting(false);
            if (!byEmail && card.invitation) void navigate(letterPlace(card.invitation.id));
            else onDone(`${card.name} is invited.`);
          }}
        />
      ) : null}
      <AlertDialog
        open={ending !== null}
        onOpenChange={(open) => {
          if (!open) setEnding(null);
        }}
        title={`End the help of ${ending?.name ?? ''}?`}
        description={
          <>
            <p>They see nothing more of this record, also on screens that are open now.</p>
            <Refused error={end.error} />
          </>
        }
        cancelLabel="Keep"
        confirm={{
          label: 'End',
          danger: true,
          busy: end.isPending,
          onConfirm: () => {
            if (!ending) return;
            end.mutate(ending.id, {
              onSuccess: () => {
                setEnding(null);
                onDone(`The help of ${ending.name} has ended.`);
              },
            });
          },
        }}
      />
    </section>
  );
}
