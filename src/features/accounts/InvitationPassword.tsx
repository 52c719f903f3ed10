import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { RadioTiles } from '#src/components/RadioTiles.tsx';
import { EntryStep } from './EntryStep.tsx';
import { useAcceptByPassword } from './invitation-queries.ts';
import type { DeviceChoice, InvitationKey, SeenInvitation } from './invitation-queries.ts';
import { NewPasswordForm } from './NewPasswordForm.tsx';
import { isCode } from './refusal.ts';

type Props = {
  invitation: InvitationKey;
  seen: SeenInvitation;
  device: DeviceChoice | null;
  onDevice: (device: DeviceChoice) => void;
  onSpent: () => void;
  onBack: () => void;
};

/** The other way in: a few words. Whose device it is is asked here where it was not said before. */
export function InvitationPassword({ invitation, seen, device, onDevice, onSpent, onBack }: Props) {
  const { t } = useTranslation('accounts');
  const accept = useAcceptByPassword(invitation);
  const staff = seen.kind === 'staff';
  const [undecided, setUndecided] = useState(false);
  function mayGoOn(): boolean {
    const missing = !staff && device === null;
    setUndecided(missing);
    return !missing;
  }
  return (
    <EntryStep
      title={t('invitation.passphraseTitle')}
      documentTitle={t('invitation.document')}
      detail={seen.email ? t('invitation.passphraseLead', { email: seen.email }) : null}
    >
      <NewPasswordForm
        label={t(staff ? 'passphrase.newPassword' : 'passphrase.label')}
        submitLabel={t('invitation.accept')}
        busy={accept.isPending}
        error={accept.error}
        email={seen.email}
        mayGoOn={mayGoOn}
        onPassword={(password) =>
          accept.mutate(
            { password, staySignedIn: device === 'own' },
            {
              onError: (error) => {
                if (isCode(error, 'link-spent')) onSpent();
              },
            },
          )
        }
      >
        {staff ? null : (
          <RadioTiles
            legend={t('invitation.whose')}
            options={[
              { value: 'own', label: t('invitation.own'), detail: t('invitation.ownHelp') },
              { value: 'shared', label: t('invitation.shared'), detail: t('invitation.sharedHelp') },
            ]}
            value={device}
            onChange={(chosen) => {
              onDevice(chosen);
              setUndecided(false);
            }}
            error={undecided ? t('invitation.chooseDevice') : undefined}
          />
        )}
      </NewPasswordForm>
      <div className="-mx-4">
        <Button variant="quiet" onClick={onBack}>
          {t('invitation.backToPasskey')}
        </Button>
      </div>
    </EntryStep>
  );
}
