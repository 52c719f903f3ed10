import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useSession } from '#src/app/session.tsx';
import { Button } from '#src/components/Button.tsx';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { EntryStep } from '#src/features/accounts/EntryStep.tsx';
import { InvitationSteps } from '#src/features/accounts/InvitationSteps.tsx';
import { LetterCodeForm } from '#src/features/accounts/LetterCodeForm.tsx';
import { TextLink } from '#src/features/accounts/TextLink.tsx';
import type { InvitationKey, SeenInvitation } from '#src/features/accounts/invitation-queries.ts';

type Found = { invitation: InvitationKey; seen: SeenInvitation };

/** `/start`: the way in for whoever holds a letter and cannot scan its picture. */
export function StartPage() {
  const { t } = useTranslation('accounts');
  const [found, setFound] = useState<Found | null>(null);
  const somebodyHere = Boolean(useSession().data?.me);
  return (
    <EntryFrame>
      {found ? (
        <div className="grid gap-5">
          <InvitationSteps {...found} somebodyHere={somebodyHere} />
          <div className="-mx-4">
            <Button variant="quiet" onClick={() => setFound(null)}>
              {t('start.otherCode')}
            </Button>
          </div>
        </div>
      ) : (
        <EntryStep title={t('start.title')} detail={t('start.lead')}>
          <LetterCodeForm onFound={(invitation, seen) => setFound({ invitation, seen })} />
          <p className="text-sm text-ink-soft">{t('start.noLetter')}</p>
          <div>
            <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
          </div>
        </EntryStep>
      )}
    </EntryFrame>
  );
}
