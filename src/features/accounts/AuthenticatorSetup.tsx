import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { Refusal } from './Refusal.tsx';
import { isCode, useRefusal } from './refusal.ts';
import { SixDigitForm } from './SixDigitForm.tsx';
import { useConfirmAuthenticator } from './ways-in-queries.ts';

type Props = {
  setup: { secret: string; uri: string; picture: string };
  onConfirmed: (recoveryCodes: string[]) => void;
};

/** In groups of four, which are easier to type than one long row. */
const grouped = (secret: string): string => secret.replace(/(.{4})(?=.)/g, '$1 ');

/** Puts the secret into an authenticator app; the first code that the app shows proves that it is there. */
export function AuthenticatorSetup({ setup, onConfirmed }: Props) {
  const { t } = useTranslation('accounts');
  const confirm = useConfirmAuthenticator();
  const wrong = isCode(confirm.error, 'wrong-code');
  const refusal = useRefusal(confirm.error);
  return (
    <div className="grid gap-5">
      <div className="grid gap-3">
        <p>{t('setUp.scan')}</p>
        <img src={setup.picture} alt={t('setUp.picture')} className="size-56 rounded border border-wire" />
        <div>
          <LinkButton href={setup.uri} variant="outline">
            {t('setUp.onThisDevice')}
          </LinkButton>
        </div>
        <p>
          {t('setUp.type')}{' '}
          <span className="font-mono font-bold break-words select-all">{grouped(setup.secret)}</span>
        </p>
      </div>
      <Refusal text={wrong ? null : refusal} />
      <SixDigitForm
        label={t('setUp.confirm')}
        error={wrong ? t('setUp.wrong') : null}
        submitLabel={t('second.go')}
        busy={confirm.isPending}
        onCode={(code, refused) =>
          confirm.mutate(code, {
            onSuccess: ({ recoveryCodes }) => onConfirmed(recoveryCodes),
            onError: refused,
          })
        }
      />
    </div>
  );
}
