import { useTranslation } from 'react-i18next';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { AccountRefused } from '#src/app/AccountRefused.tsx';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { useEndCaregiver } from './queries.ts';

type Props = { card: CaregiverCard; onClose: () => void };

/** Asks once, and then ends it at once. */
export function EndDialog({ card, onClose }: Props) {
  const { t } = useTranslation('caregivers');
  const { name } = card;
  const end = useEndCaregiver();
  return (
    <AlertDialog
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title={t('ending.title', { name })}
      description={
        <div className="grid gap-3">
          <p>{t('ending.body', { name })}</p>
          <AccountRefused error={end.error} />
        </div>
      }
      cancelLabel={t('ending.stay')}
      confirm={{
        label: t('ending.confirm'),
        onConfirm: () => end.mutate(card.id, { onSuccess: onClose }),
        danger: true,
        busy: end.isPending,
      }}
    />
  );
}
