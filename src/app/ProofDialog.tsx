import { useMutation, useQuery } from '@tanstack/react-query';
import { KeyRound } from 'lucide-react';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { askPasskeyProof, proveSession } from '#shared/accounts/contract.ts';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { Dialog } from '#src/components/Dialog.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { ProofPasswordForm } from '#src/features/accounts/ProofPasswordForm.tsx';
import { Refusal } from '#src/features/accounts/Refusal.tsx';
import { SixDigitForm } from '#src/features/accounts/SixDigitForm.tsx';
import { isCode, useRefusal } from '#src/features/accounts/refusal.ts';
import { waysInQuery } from '#src/features/accounts/ways-in-query.ts';
import { call } from '#src/lib/api.ts';
import { answerWithPasskey, passkeysSupported } from '#src/lib/passkeys.ts';

export type ProofDialogProps = {
  /** Says once whether the person has proved who they are. */
  onAnswer: (proven: boolean) => void;
};

type Way = 'passkey' | 'password' | 'authenticator';
type Proof = RequestOf<typeof proveSession>['body'];

const switchWords = {
  passkey: 'proof.usePasskey',
  password: 'proof.usePassword',
  authenticator: 'proof.useCode',
} as const;

/** The ways that this person has and this browser can use, the easiest first. */
function waysOf({ passkeys, hasPassword, authenticator }: WaysIn): Way[] {
  const ways: Way[] = [];
  if (passkeys.length > 0 && passkeysSupported()) ways.push('passkey');
  if (hasPassword) ways.push('password');
  if (authenticator) ways.push('authenticator');
  return ways;
}

const prove = (body: Proof) => call<typeof proveSession>('post', '/api/session/proof', { body });

async function proveByPasskey() {
  const question = await call<typeof askPasskeyProof>('post', '/api/session/proof/passkey-question', {});
  await prove({ way: 'passkey', passkey: await answerWithPasskey(question) });
}

/** Asks who acts, over whatever was being done; closing it leaves everything as it was. */
export function ProofDialog({ onAnswer }: ProofDialogProps) {
  const { t } = useTranslation(['accounts', 'app']);
  const waysIn = useQuery(waysInQuery);
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) onAnswer(false);
      }}
      title={t('proof.title')}
      description={t('proof.lead')}
      closeLabel={t('app:cancel')}
    >
      {waysIn.data ? (
        <Ways ways={waysOf(waysIn.data)} onProven={() => onAnswer(true)} />
      ) : waysIn.isError ? (
        <ErrorState
          title={t('proof.failed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void waysIn.refetch(),
            busy: waysIn.isFetching,
          }}
        />
      ) : (
        <LoadingState label={t('loading')} lines={2} />
      )}
    </Dialog>
  );
}

function Ways({ ways, onProven }: { ways: Way[]; onProven: () => void }) {
  const { t } = useTranslation('accounts');
  const [way, setWay] = useState(ways[0]);
  const proving = useMutation({
    mutationFn: (proof: Proof | 'passkey') => (proof === 'passkey' ? proveByPasskey() : prove(proof)),
    onSuccess: onProven,
  });
  // A wrong password is refused by either name; both mean the field.
  const wrong = isCode(proving.error, 'wrong-code', 'wrong-sign-in');
  const refusal = useRefusal(proving.error, { wrongCode: t('second.wrongPasskey') });
  if (way === undefined) return <p>{t('proof.noWay')}</p>;
  return (
    <div className="grid gap-4">
      <Refusal text={wrong && way !== 'passkey' ? null : refusal} />
      {way === 'passkey' ? (
        <Button
          size="large"
          block
          icon={KeyRound}
          busy={proving.isPending}
          onClick={() => proving.mutate('passkey')}
        >
          {t('proof.usePasskey')}
        </Button>
      ) : null}
      {way === 'password' ? (
        <ProofPasswordForm
          error={wrong ? t('proof.wrongPassword') : null}
          busy={proving.isPending}
          onPassword={(password, refused) =>
            proving.mutate({ way: 'password', password }, { onError: refused })
          }
        />
      ) : null}
      {way === 'authenticator' ? (
        <SixDigitForm
          label={t('second.authenticatorLabel')}
          hint={t('second.authenticatorHelp')}
          error={wrong ? t('second.wrong') : null}
          submitLabel={t('proof.go')}
          busy={proving.isPending}
          onCode={(code, refused) => proving.mutate({ way: 'authenticator', code }, { onError: refused })}
        />
      ) : null}
      <div className="grid justify-items-start">
        {ways
          .filter((other) => other !== way)
          .map((other) => (
            <Button
              key={other}
              variant="quiet"
              onClick={() => {
                proving.reset();
                setWay(other);
              }}
            >
              {t(switchWords[other])}
            </Button>
          ))}
      </div>
    </div>
  );
}
