import { KeyRound } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { usePasskeySignIn } from './queries.ts';
import { Refusal } from './Refusal.tsx';
import { useRefusal } from './refusal.ts';

type Props = { staySignedIn: boolean; first: boolean };

/** The way in without typing. Where it does not work it says so, and the form beside it stays as it is. */
export function PasskeySignIn({ staySignedIn, first }: Props) {
  const { t } = useTranslation('accounts');
  const signIn = usePasskeySignIn();
  const refusal = useRefusal(signIn.error, { wrongCode: t('trouble.use.failed') });
  return (
    <div className="grid gap-3">
      <Refusal text={refusal} />
      <Button
        size="large"
        block
        variant={first ? 'primary' : 'outline'}
        icon={KeyRound}
        busy={signIn.isPending}
        onClick={() => signIn.mutate(staySignedIn)}
      >
        {t('passkeySignIn')}
      </Button>
      <p className="text-sm text-ink-soft">{t('passkeyHelp')}</p>
    </div>
  );
}
