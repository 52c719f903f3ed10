import { KeyRound } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { SignInStep } from '#shared/accounts/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { passkeysSupported } from '#src/lib/passkeys.ts';
import { remembers } from './device-memory.ts';
import { EntryStep } from './EntryStep.tsx';
import { useGivePasskey, useGiveSecondFactor } from './queries.ts';
import { RecoveryCodeForm } from './RecoveryCodeForm.tsx';
import { Refusal } from './Refusal.tsx';
import { isCode, useRefusal } from './refusal.ts';
import { SixDigitForm } from './SixDigitForm.tsx';

export type PendingSignIn = Extract<SignInStep, { next: 'second-factor' }>;
type Way = PendingSignIn['ways'][number];

type Props = { pending: PendingSignIn; onStartAgain: () => void };

const switchWords = {
  passkey: 'second.usePasskey',
  authenticator: 'second.useAuthenticator',
  'recovery-code': 'second.useRecovery',
} as const;

/** The way to begin with: what this browser has used, else the app, which every device can read off. */
function firstOf(ways: readonly Way[]): Way | null {
  if (ways.includes('passkey') && remembers('passkey-used')) return 'passkey';
  return ways.includes('authenticator') ? 'authenticator' : (ways[0] ?? null);
}

/** The password was right; now the second thing that shows who it is. */
export function SecondStep({ pending, onStartAgain }: Props) {
  const { t } = useTranslation('accounts');
  const ways = pending.ways.filter((way) => way !== 'passkey' || passkeysSupported());
  const [way, setWay] = useState(() => firstOf(ways));
  const code = useGiveSecondFactor(pending.pendingId);
  const passkey = useGivePasskey(pending.pendingId);
  const field = useRef<HTMLInputElement>(null);
  // Past the heading: the field says what the step is about, and staff type a code several times a day.
  useEffect(() => field.current?.focus(), [way]);
  const error = way === 'passkey' ? passkey.error : code.error;
  const wrong = isCode(error, 'wrong-code');
  // The half-done sign-in is over: no other code helps, only another beginning.
  const over = isCode(error, 'link-spent', 'not-found');
  const refusal = useRefusal(error, { wrongCode: t('second.wrongPasskey') });
  const beside = wrong && way !== 'passkey';
  function turnTo(other: Way) {
    code.reset();
    passkey.reset();
    setWay(other);
  }
  return (
    <EntryStep title={t('second.title')}>
      <Refusal text={over ? t('second.spent') : beside ? null : refusal} />
      {over || way === null ? (
        <Button size="large" block onClick={onStartAgain}>
          {t('startAgain')}
        </Button>
      ) : (
        <>
          {way === 'authenticator' ? (
            <SixDigitForm
              fieldRef={field}
              label={t('second.authenticatorLabel')}
              hint={t('second.authenticatorHelp')}
              error={beside ? t('second.wrong') : null}
              submitLabel={t('second.go')}
              busy={code.isPending}
              onCode={(digits, refused) =>
                code.mutate({ way: 'authenticator', code: digits }, { onError: refused })
              }
            />
          ) : null}
          {way === 'recovery-code' ? (
            <RecoveryCodeForm
              fieldRef={field}
              error={beside ? t('second.wrongRecovery') : null}
              busy={code.isPending}
              onCode={(typed, refused) =>
                code.mutate({ way: 'recovery-code', code: typed }, { onError: refused })
              }
            />
          ) : null}
          {way === 'passkey' ? (
            <div className="grid gap-3">
              <p>{t('second.passkeyHelp')}</p>
              <Button
                size="large"
                block
                icon={KeyRound}
                busy={passkey.isPending}
                onClick={() => passkey.mutate()}
              >
                {t('second.usePasskey')}
              </Button>
            </div>
          ) : null}
          <div className="-mx-4 grid justify-items-start">
            {ways
              .filter((other) => other !== way)
              .map((other) => (
                <Button key={other} variant="quiet" onClick={() => turnTo(other)}>
                  {t(switchWords[other])}
                </Button>
              ))}
            <Button variant="quiet" onClick={onStartAgain}>
              {t('second.other')}
            </Button>
          </div>
        </>
      )}
    </EntryStep>
  );
}
