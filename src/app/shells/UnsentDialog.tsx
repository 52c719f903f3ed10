import { useTranslation } from 'react-i18next';
import { AlertDialog } from '#src/components/AlertDialog.tsx';

type Props = { busy: boolean; onStay: () => void; onDiscard: () => void };

/** Before a sign-out that would lose a check-in that is not sent. */
export function UnsentDialog({ busy, onStay, onDiscard }: Props) {
  const { t } = useTranslation();
  return (
    <AlertDialog
      open
      onOpenChange={(open) => {
        if (!open) onStay();
      }}
      title={t('signingOut.unsent.title')}
      description={t('signingOut.unsent.body')}
      cancelLabel={t('signingOut.unsent.stay')}
      confirm={{
        label: t('signingOut.unsent.discard'),
        onConfirm: onDiscard,
        danger: true,
        busy,
      }}
    />
  );
}
