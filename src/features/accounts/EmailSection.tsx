import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Button } from '#src/components/Button.tsx';
import { ActResult } from './ActResult.tsx';
import { EmailForm } from './EmailForm.tsx';
import { useAskEmailChange } from './ways-in-queries.ts';
import { WaysInSection } from './WaysInSection.tsx';

/** The address that one signs in with. A new one holds once its own mail was opened. */
export function EmailSection({ waysIn }: { waysIn: WaysIn }) {
  const { t } = useTranslation(['accounts', 'app']);
  const [open, setOpen] = useState(false);
  const change = useAskEmailChange();
  const { email, pendingEmail } = waysIn;
  return (
    <WaysInSection title={t('waysIn.email.title')}>
      <p className="wrap-anywhere">{t('waysIn.email.now', { email })}</p>
      {pendingEmail && !change.isSuccess ? (
        <p className="wrap-anywhere text-ink-soft">{t('waysIn.email.pending', { email: pendingEmail })}</p>
      ) : null}
      <ActResult
        done={change.isSuccess ? t('waysIn.email.sent', { email: change.variables }) : null}
        refusal={null}
      />
      {open ? (
        <div className="grid max-w-md gap-2">
          <EmailForm
            label={t('waysIn.email.field')}
            submitLabel={t('waysIn.email.send')}
            busy={change.isPending}
            error={change.error}
            onEmail={(wanted) => change.mutate(wanted, { onSuccess: () => setOpen(false) })}
          />
          <Button variant="quiet" onClick={() => setOpen(false)}>
            {t('app:cancel')}
          </Button>
        </div>
      ) : (
        <div>
          <Button variant="outline" onClick={() => setOpen(true)}>
            {t('waysIn.email.change')}
          </Button>
        </div>
      )}
    </WaysInSection>
  );
}
