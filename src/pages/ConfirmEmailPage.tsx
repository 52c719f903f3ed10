import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { EntryStep } from '#src/features/accounts/EntryStep.tsx';
import { Refusal } from '#src/features/accounts/Refusal.tsx';
import { SpentLink } from '#src/features/accounts/SpentLink.tsx';
import { useConfirmEmail } from '#src/features/accounts/link-queries.ts';
import { useOneTimeSecret } from '#src/features/accounts/one-time-secret.ts';
import { isCode, useRefusal } from '#src/features/accounts/refusal.ts';

/**
 * `/confirm-email#secret`: a new address begins to hold. It takes a press, since programs that look into mail
 * open links by themselves.
 */
export function ConfirmEmailPage() {
  const { t } = useTranslation('accounts');
  const secret = useOneTimeSecret();
  const confirm = useConfirmEmail(secret ?? '');
  const refusal = useRefusal(confirm.error);
  if (confirm.isSuccess) {
    return (
      <EntryFrame>
        <EntryStep key="done" title={t('confirmEmail.doneTitle')}>
          <p>{t('confirmEmail.done')}</p>
          <LinkButton to="/" size="large" block>
            {t('confirmEmail.goOn')}
          </LinkButton>
        </EntryStep>
      </EntryFrame>
    );
  }
  return (
    <EntryFrame>
      {secret === null || isCode(confirm.error, 'link-spent', 'not-found') ? (
        <SpentLink title={t('confirmEmail.spentTitle')} body={t('confirmEmail.spent')} />
      ) : (
        <EntryStep key="ask" title={t('confirmEmail.title')} detail={t('confirmEmail.lead')}>
          <Refusal text={refusal} />
          <Button size="large" block busy={confirm.isPending} onClick={() => confirm.mutate()}>
            {t('confirmEmail.confirm')}
          </Button>
        </EntryStep>
      )}
    </EntryFrame>
  );
}
