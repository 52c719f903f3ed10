import { Mail, Printer } from 'lucide-react';
import { useNavigate } from 'react-router-dom';
import type { StaffPerson } from '#shared/people/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { isOpenInvitation } from '#src/lib/invitation-words.ts';
import { staffLetterPlace } from './people-places.ts';
import { useReinviteStaff } from './queries.ts';
import { staffStateWords } from './words.ts';

type Props = { person: StaffPerson; nowMs: number; timeZone: string; onKept: (words: string) => void };

/** For somebody who has not come yet. Whoever has signed in keeps their way in and gets no other from here. */
export function StaffInvitation({ person, nowMs, timeZone, onKept }: Props) {
  const navigate = useNavigate();
  const reinvite = useReinviteStaff(person.id);
  const open = isOpenInvitation(person.invitation, nowMs) ? person.invitation : null;

  function invite(byEmail: boolean) {
    reinvite.mutate(byEmail, {
      onSuccess: ({ invitation }) => {
        if (byEmail) onKept('A new invitation is on its way. The old one opens nothing any more.');
        else if (invitation) void navigate(staffLetterPlace(invitation.id));
      },
    });
  }
  return (
    <section aria-labelledby="invitation-heading" className="grid gap-3">
      <SectionHeading id="invitation-heading" wire>
        Invitation
      </SectionHeading>
      <p>
        {staffStateWords(person, nowMs, timeZone)}
        {open ? `. Valid until ${formatMoment(open.expiresAt, nowMs, timeZone)}.` : '.'}
      </p>
      {person.emailBounced ? (
        <Banner tone="warning" title="Mail to this person came back.">
          Check the e-mail address with them, or use the letter.
        </Banner>
      ) : null}
      {person.active ? (
        <div className="flex flex-wrap gap-2">
          {open ? (
            <LinkButton to={staffLetterPlace(open.id)} variant="outline" icon={Printer}>
              Open the letter
            </LinkButton>
          ) : (
            <Button variant="outline" icon={Printer} busy={reinvite.isPending} onClick={() => invite(false)}>
              New letter
            </Button>
          )}
          <Button variant="outline" icon={Mail} busy={reinvite.isPending} onClick={() => invite(true)}>
            Send a new one by e-mail
          </Button>
        </div>
      ) : null}
      <Refused error={reinvite.error} />
    </section>
  );
}
