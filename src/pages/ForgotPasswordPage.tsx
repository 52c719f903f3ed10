import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { EmailForm } from '#src/features/accounts/EmailForm.tsx';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { EntryStep } from '#src/features/accounts/EntryStep.tsx';
import { TextLink } from '#src/features/accounts/TextLink.tsx';
import { useAskReset } from '#src/features/accounts/link-queries.ts';

/** `/forgot-password`. What it says is the same for an address that is known and one that is not. */
export function ForgotPasswordPage() {
  const { t } = useTranslation('accounts');
  const ask = useAskReset();
  return (
    <EntryFrame>
      {ask.isSuccess ? (
        <EntryStep key="sent" title={t('forgotten.sentTitle')}>
          <p>{t('forgotten.sent')}</p>
          <p className="text-ink-soft">{t('forgotten.notThere')}</p>
          <Button variant="outline" size="large" block onClick={() => ask.reset()}>
            {t('forgotten.again')}
          </Button>
          <div>
            <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
          </div>
        </EntryStep>
      ) : (
        <EntryStep key="ask" title={t('forgotten.title')} detail={t('forgotten.lead')}>
          <EmailForm
            label={t('email')}
            submitLabel={t('forgotten.send')}
            busy={ask.isPending}
            error={ask.error}
            onEmail={(email) => ask.mutate(email)}
          />
          <div>
            <TextLink to="/sign-in">{t('toSignIn')}</TextLink>
          </div>
        </EntryStep>
      )}
    </EntryFrame>
  );
}
