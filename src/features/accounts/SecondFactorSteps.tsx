import { KeyRound, Smartphone } from 'lucide-react';
import { useEffect, useState } from 'react';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { passkeysSupported, preloadPasskeys } from '#src/lib/passkeys.ts';
import { AuthenticatorSetup } from './AuthenticatorSetup.tsx';
import { DeviceTile } from './DeviceTile.tsx';
import { EntryStep } from './EntryStep.tsx';
import { RecoveryCodes } from './RecoveryCodes.tsx';
import { Refusal } from './Refusal.tsx';
import { useRefusal } from './refusal.ts';
import { useAddPasskey, useNewRecoveryCodes, useStartAuthenticator } from './ways-in-queries.ts';

type Props = {
  onDone: () => Promise<void>;
  /** The way out, as long as nothing would be lost by it. */
  wayOut: ReactNode;
};

/** From having a password only to a second step and the codes for the day on which it is not at hand. */
export function SecondFactorSteps({ onDone, wayOut }: Props) {
  const { t } = useTranslation('accounts');
  const [codes, setCodes] = useState<string[] | null>(null);
  const passkey = useAddPasskey();
  const recovery = useNewRecoveryCodes();
  const app = useStartAuthenticator();
  const refusal = useRefusal(passkey.error ?? app.error, { passkey: 'add' });
  useEffect(preloadPasskeys, []);
  const addPasskey = () =>
    passkey.mutate(undefined, {
      onSuccess: () =>
        recovery.mutate(undefined, { onSuccess: ({ recoveryCodes }) => setCodes(recoveryCodes) }),
    });

  if (codes) {
    return (
      <EntryStep key="codes" title={t('codes.title')}>
        <RecoveryCodes codes={codes} onKept={() => void onDone()} />
      </EntryStep>
    );
  }
  if (recovery.isError) {
    return (
      <EntryStep key="no-codes" title={t('codes.title')}>
        <Banner tone="warning" announce="alert">
          {t('codes.failed')}
        </Banner>
        <Button size="large" block onClick={() => void onDone()}>
          {t('codes.goOn')}
        </Button>
      </EntryStep>
    );
  }
  if (app.data) {
    return (
      <EntryStep key="app" title={t('setUp.scanTitle')}>
        <AuthenticatorSetup setup={app.data} onConfirmed={setCodes} />
        <div className="-mx-4 grid justify-items-start">
          <Button variant="quiet" onClick={() => app.reset()}>
            {t('setUp.back')}
          </Button>
          {wayOut}
        </div>
      </EntryStep>
    );
  }
  const busy = passkey.isPending || recovery.isPending;
  return (
    <EntryStep key="choice" title={t('setUp.title')} detail={t('setUp.lead')}>
      <Refusal text={refusal} />
      <div className="grid gap-3">
        {passkeysSupported() ? (
          <DeviceTile
            icon={KeyRound}
            label={t('setUp.passkey')}
            detail={t('setUp.passkeyHelp')}
            busy={busy}
            onClick={() => {
              app.reset();
              if (!busy) addPasskey();
            }}
          />
        ) : null}
        <DeviceTile
          icon={Smartphone}
          label={t('setUp.authenticator')}
          detail={t('setUp.authenticatorHelp')}
          busy={app.isPending}
          onClick={() => {
            passkey.reset();
            if (!busy && !app.isPending) app.mutate();
          }}
        />
      </div>
      <div className="-mx-4">{wayOut}</div>
    </EntryStep>
  );
}
