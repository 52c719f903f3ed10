import { Mail, Printer, Smartphone } from 'lucide-react';
import { useNavigate } from 'react-router-dom';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { comingWords, isOpenInvitation } from '#src/lib/invitation-words.ts';
import { letterPlace, phonePlace } from './patient-places.ts';
import { useReinvitePatient } from './queries.ts';

type Props = {
  record: PatientRecord;
  nowMs: number;
  timeZone: string;
  onSent: (words: string) => void;
};

/** How the patient gets in: what was sent, until when it holds, and the ways to do it again. */
export function InvitationSection({ record, nowMs, timeZone, onSent }: Props) {
  const navigate = useNavigate();
  const reinvite = useReinvitePatient();
  const { id: patientId, invitation } = record;
  // Whoever has come before may have lost the way in, and gets a new one.
  const known = invitation !== null || record.firstSignedInAt !== null;
  const open = isOpenInvitation(invitation, nowMs) ? invitation : null;

  function invite(byEmail: boolean) {
    reinvite.mutate(
      { patientId, byEmail },
      {
        onSuccess: ({ id }) => {
          if (byEmail) onSent('A new invitation is on its way. The old one opens nothing any more.');
          else void navigate(letterPlace(id));
        },
      },
    );
  }
  return (
    <section aria-labelledby="invitation-heading" className="grid gap-3">
      <SectionHeading id="invitation-heading" wire>
        Way in
      </SectionHeading>
      <p>{comingWords(record, nowMs, timeZone) ?? 'Signs in and checks in.'}</p>
      {open ? (
        <p className="text-sm text-ink-soft">
          {open.byEmail ? 'Sent by e-mail' : 'By letter'}, valid until{' '}
          {formatMoment(open.expiresAt, nowMs, timeZone)}.
        </p>
      ) : null}
      {record.emailBounced ? (
        <Banner tone="warning" title="Mail to this patient came back.">
          Check the e-mail address, or use the letter.
        </Banner>
      ) : null}
      {record.state === 'ended' ? null : (
        <div className="grid justify-items-start gap-2">
          {open ? (
            <>
              <LinkButton to={phonePlace(open.id)} variant="outline" icon={Smartphone}>
                Set up on their phone here
              </LinkButton>
              <LinkButton to={letterPlace(open.id)} variant="outline" icon={Printer}>
                Open the letter
              </LinkButton>
            </>
          ) : null}
          <Button variant="outline" icon={Mail} busy={reinvite.isPending} onClick={() => invite(true)}>
            {known ? 'New invitation by e-mail' : 'Invite by e-mail'}
          </Button>
          {open ? null : (
            <Button variant="outline" icon={Printer} busy={reinvite.isPending} onClick={() => invite(false)}>
              {known ? 'New letter' : 'Invite by letter'}
            </Button>
          )}
        </div>
      )}
      <Refused error={reinvite.error} />
    </section>
  );
}
