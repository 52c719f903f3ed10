import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Button } from '#src/components/Button.tsx';
import { ActResult } from './ActResult.tsx';
import { NewPasswordForm } from './NewPasswordForm.tsx';
import { useChangePassword } from './ways-in-queries.ts';
import { WaysInSection } from './WaysInSection.tsx';

/** One's own password: a new one signs every other device out. */
export function PasswordSection({ waysIn }: { waysIn: WaysIn }) {
  const { t } = useTranslation(['accounts', 'app']);
  const [open, setOpen] = useState(false);
  const change = useChangePassword();
  return (
    <WaysInSection title={t('waysIn.password.title')}>
      <p>{t(waysIn.hasPassword ? 'waysIn.password.has' : 'waysIn.password.none')}</p>
      <ActResult done={change.isSuccess ? t('waysIn.password.done') : null} refusal={null} />
      {open ? (
        <div className="grid max-w-md gap-2">
          <NewPasswordForm
            label={t('passphrase.newPassword')}
            submitLabel={t('save')}
            busy={change.isPending}
            error={change.error}
            email={waysIn.email}
            onPassword={(password) => change.mutate(password, { onSuccess: () => setOpen(false) })}
          />
          <Button variant="quiet" onClick={() => setOpen(false)}>
            {t('app:cancel')}
          </Button>
        </div>
      ) : (
        <div>
          <Button variant="outline" onClick={() => setOpen(true)}>
            {t(waysIn.hasPassword ? 'waysIn.password.change' : 'waysIn.password.set')}
          </Button>
        </div>
      )}
    </WaysInSection>
  );
}
