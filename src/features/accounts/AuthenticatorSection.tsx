import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useQueryClient } from '@tanstack/react-query';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { Dialog } from '#src/components/Dialog.tsx';
import { ActResult } from './ActResult.tsx';
import { AuthenticatorSetup } from './AuthenticatorSetup.tsx';
import { RecoveryCodes } from './RecoveryCodes.tsx';
import { useRefusal } from './refusal.ts';
import { waysInQuery } from './ways-in-query.ts';
import { useNewRecoveryCodes, useRemoveAuthenticator, useStartAuthenticator } from './ways-in-queries.ts';
import { WaysInSection } from './WaysInSection.tsx';

type Asking = 'remove' | 'codes' | null;
type Done = 'set-up' | 'removed' | 'codes' | null;

const doneWords = {
  'set-up': 'waysIn.authenticator.done',
  removed: 'waysIn.authenticator.removed',
  codes: 'waysIn.authenticator.newCodesDone',
} as const;

/** The authenticator app, and the codes for the day on which the second step is not at hand. */
export function AuthenticatorSection({ waysIn }: { waysIn: WaysIn }) {
  const { t } = useTranslation(['accounts', 'app']);
  const queryClient = useQueryClient();
  const [asking, setAsking] = useState<Asking>(null);
  const [codes, setCodes] = useState<{ list: string[]; of: 'set-up' | 'codes' } | null>(null);
  const [done, setDone] = useState<Done>(null);
  const setUp = useStartAuthenticator();
  const remove = useRemoveAuthenticator();
  const renew = useNewRecoveryCodes();
  const refusal = useRefusal(setUp.error ?? remove.error ?? renew.error);
  const { authenticator, passkeys, recoveryCodesLeft } = waysIn;
  function begin(act: () => void) {
    setDone(null);
    [setUp, remove, renew].forEach((mutation) => mutation.reset());
    setAsking(null);
    act();
  }
  function finish() {
    setDone(codes?.of ?? null);
    setCodes(null);
    setUp.reset();
    void queryClient.invalidateQueries(waysInQuery);
  }
  return (
    <WaysInSection title={t('waysIn.authenticator.title')}>
      <p>
        {t(authenticator ? 'waysIn.authenticator.on' : 'waysIn.authenticator.off')}{' '}
        {authenticator || passkeys.length > 0
          ? t('waysIn.authenticator.codesLeft', { count: recoveryCodesLeft })
          : null}
      </p>
      <ActResult done={done ? t(doneWords[done]) : null} refusal={refusal} />
      <div className="flex flex-wrap gap-3">
        <Button variant="outline" busy={setUp.isPending} onClick={() => begin(() => setUp.mutate())}>
          {t(authenticator ? 'waysIn.authenticator.replace' : 'waysIn.authenticator.setUp')}
        </Button>
        {authenticator || passkeys.length > 0 ? (
          <Button variant="outline" busy={renew.isPending} onClick={() => setAsking('codes')}>
            {t('waysIn.authenticator.newCodes')}
          </Button>
        ) : null}
        {authenticator ? (
          <Button variant="quiet" busy={remove.isPending} onClick={() => setAsking('remove')}>
            {t('waysIn.authenticator.remove')}
          </Button>
        ) : null}
      </div>
      <Dialog
        open={setUp.data !== undefined && codes === null}
        onOpenChange={(open) => {
          if (!open) setUp.reset();
        }}
        title={t('setUp.scanTitle')}
        closeLabel={t('app:cancel')}
      >
        {setUp.data ? (
          <AuthenticatorSetup setup={setUp.data} onConfirmed={(list) => setCodes({ list, of: 'set-up' })} />
        ) : null}
      </Dialog>
      <Dialog
        open={codes !== null}
        // Only the button below the codes leads on: a press beside them would lose them for good.
        onOpenChange={() => undefined}
        title={t('codes.title')}
      >
        {codes ? <RecoveryCodes codes={codes.list} onKept={finish} /> : null}
      </Dialog>
      <AlertDialog
        open={asking === 'remove'}
        onOpenChange={(open) => {
          if (!open) setAsking(null);
        }}
        title={t('waysIn.authenticator.confirmTitle')}
        description={t('waysIn.authenticator.confirmBody')}
        cancelLabel={t('waysIn.authenticator.keep')}
        confirm={{
          label: t('waysIn.authenticator.remove'),
          danger: true,
          onConfirm: () => begin(() => remove.mutate(undefined, { onSuccess: () => setDone('removed') })),
        }}
      />
      <AlertDialog
        open={asking === 'codes'}
        onOpenChange={(open) => {
          if (!open) setAsking(null);
        }}
        title={t('waysIn.authenticator.newCodesTitle')}
        description={t('waysIn.authenticator.newCodesBody')}
        cancelLabel={t('app:cancel')}
        confirm={{
          label: t('waysIn.authenticator.newCodes'),
          onConfirm: () =>
            begin(() =>
              renew.mutate(undefined, {
                onSuccess: ({ recoveryCodes }) => setCodes({ list: recoveryCodes, of: 'codes' }),
              }),
            ),
        }}
      />
    </WaysInSection>
  );
}
