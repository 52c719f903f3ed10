import { Smartphone, Users } from 'lucide-react';
import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { passkeysSupported, preloadPasskeys } from '#src/lib/passkeys.ts';
import { DeviceTile } from './DeviceTile.tsx';
import { EntryStep } from './EntryStep.tsx';
import { useAcceptByPasskey } from './invitation-queries.ts';
import type { DeviceChoice, InvitationKey, SeenInvitation } from './invitation-queries.ts';
import { Refusal } from './Refusal.tsx';
import { isCode, useRefusal } from './refusal.ts';

type Props = {
  invitation: InvitationKey;
  seen: SeenInvitation;
  device: DeviceChoice | null;
  note: string | null;
  onDevice: (device: DeviceChoice) => void;
  onSpent: () => void;
  onPassword: () => void;
};

/** The welcome. One press says whose device it is and makes the passkey; the next screen is Today. */
export function InvitationWelcome({ invitation, seen, device, note, onDevice, onSpent, onPassword }: Props) {
  const { t } = useTranslation('accounts');
  const accept = useAcceptByPasskey(invitation);
  const refusal = useRefusal(accept.error, { passkey: 'make', wrongCode: t('trouble.make.failed') });
  const supported = passkeysSupported();
  const staff = seen.kind === 'staff';
  useEffect(preloadPasskeys, []);
  const byPasskey = (stay: boolean) =>
    accept.mutate(stay, {
      onError: (error) => {
        if (isCode(error, 'link-spent')) onSpent();
      },
    });
  function choose(chosen: DeviceChoice) {
    if (accept.isPending) return;
    onDevice(chosen);
    // A passkey opens to whoever can unlock the device: on one that others use it would be theirs too.
    if (supported && chosen === 'own') byPasskey(true);
    else onPassword();
  }
  const tile = (choice: DeviceChoice) => ({
    busy: accept.isPending && device === choice,
    onClick: () => choose(choice),
  });
  return (
    <EntryStep
      title={seen.firstName ? t('invitation.welcome', { name: seen.firstName }) : t('invitation.welcomeAll')}
      documentTitle={t('invitation.document')}
      detail={t(`invitation.from.${seen.kind}`, { clinic: seen.clinic.name })}
    >
      {note && !accept.isPending ? <Banner tone="warning">{note}</Banner> : null}
      <Refusal text={refusal} />
      {staff ? (
        <div className="grid gap-3">
          {supported ? (
            <>
              <Button size="large" block busy={accept.isPending} onClick={() => byPasskey(false)}>
                {t('invitation.staffPasskey')}
              </Button>
              <p className="text-sm text-ink-soft">{t('invitation.staffPasskeyHelp')}</p>
            </>
          ) : null}
        </div>
      ) : (
        <>
          <div role="group" aria-labelledby="whose-device" className="grid gap-3">
            <h2 id="whose-device" className="text-lg leading-snug">
              {t('invitation.whose')}
            </h2>
            <DeviceTile
              icon={Smartphone}
              label={t('invitation.own')}
              detail={t('invitation.ownHelp')}
              {...tile('own')}
            />
            <DeviceTile
              icon={Users}
              label={t('invitation.shared')}
              detail={t('invitation.sharedHelp')}
              {...tile('shared')}
            />
          </div>
          <p className="text-ink-soft">
            {t(supported ? 'invitation.passkeyNext' : 'invitation.passphraseNext')}
          </p>
        </>
      )}
      <Button
        variant={accept.isError || (staff && !supported) ? 'primary' : 'outline'}
        block
        onClick={onPassword}
      >
        {t(staff ? 'invitation.useStaffPassword' : 'invitation.usePassphrase')}
      </Button>
    </EntryStep>
  );
}
