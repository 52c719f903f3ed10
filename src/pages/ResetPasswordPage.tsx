import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { EntryStep } from '#src/features/accounts/EntryStep.tsx';
import { NewPasswordForm } from '#src/features/accounts/NewPasswordForm.tsx';
import { SpentLink } from '#src/features/accounts/SpentLink.tsx';
import { TextLink } from '#src/features/accounts/TextLink.tsx';
import { useReset } from '#src/features/accounts/link-queries.ts';
import { useOneTimeSecret } from '#src/features/accounts/one-time-secret.ts';
import { isCode } from '#src/features/accounts/refusal.ts';

/** `/reset-password#secret`: a new password by the link of the mail. */
export function ResetPasswordPage() {
  const { t } = useTranslation('accounts');
  const navigate = useNavigate();
  const secret = useOneTimeSecret();
  const reset = useReset(secret ?? '');
  const spent = secret === null || isCode(reset.error, 'link-spent', 'not-found');
  return (
    <EntryFrame>
      {spent ? (
        <SpentLink
          title={t('reset.spentTitle')}
          body={t('reset.spent')}
          again={{ to: '/forgot-password', label: t('reset.again') }}
        />
      ) : (
        <EntryStep title={t('reset.title')} detail={t('reset.lead')}>
          <NewPasswordForm
            label={t('passphrase.newPassword')}
            submitLabel={t('reset.save')}
            busy={reset.isPending}
            error={reset.error}
            onPassword={(password) =>
              reset.mutate(password, {
                onSuccess: () => void navigate('/sign-in', { replace: true, state: { ended: 'reset' } }),
              })
            }
          />
          <div>
            <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
          </div>
        </EntryStep>
      )}
    </EntryFrame>
  );
}
