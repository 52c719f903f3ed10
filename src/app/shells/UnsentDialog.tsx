import { useTranslation } from 'react-i18next';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { useSignOut } from '../sign-out.ts';

type Props = { onStay: () => void };

/** Before a sign-out that would lose a check-in that is not sent. */
export function UnsentDialog({ onStay }: Props) {
  const { t } = useTranslation('leaving');
  const signOut = useSignOut();
  return (
    <AlertDialog
      open
      onOpenChange={(open) => {
        if (!open) onStay();
      }}
      title={t('signingOut.unsent.title')}
      description={
        <>
          <p>{t('signingOut.unsent.body')}</p>
          <p role="alert" className="mt-2 font-bold text-clay empty:hidden">
            {signOut.isError ? t('signingOut.failed') : null}
          </p>
        </>
      }
      cancelLabel={t('signingOut.unsent.stay')}
      confirm={{
        label: t('signingOut.unsent.discard'),
        onConfirm: () => signOut.mutate(),
        danger: true,
        busy: signOut.isPending,
      }}
    />
  );
}
