import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { serverNow } from '#src/lib/server-clock.ts';
import { useSignOut } from './sign-out.ts';

type Props = { endsAtMs: number; stayFailed: boolean; onStay: () => void };

const secondsTo = (endsAtMs: number): number => Math.max(0, Math.ceil((endsAtMs - serverNow()) / 1000));

/** The last minute before an idle session ends. Any way of closing it but signing out keeps the session. */
export function IdleDialog({ endsAtMs, stayFailed, onStay }: Props) {
  const { t } = useTranslation(['app', 'leaving']);
  const [seconds, setSeconds] = useState(() => secondsTo(endsAtMs));
  const signOut = useSignOut();
  useEffect(() => {
    const timer = setInterval(() => setSeconds(secondsTo(endsAtMs)), 1000);
    return () => clearInterval(timer);
  }, [endsAtMs]);
  return (
    <AlertDialog
      open
      onOpenChange={(open) => {
        if (!open) onStay();
      }}
      title={t('leaving:idle.title')}
      // The seconds are shown only: a region that counts aloud would drown the question.
      description={
        <>
          <p>{t('leaving:idle.body', { count: seconds })}</p>
          <p role="alert" className="mt-2 font-bold text-clay empty:hidden">
            {signOut.isError ? t('leaving:signingOut.failed') : stayFailed ? t('failed.session') : null}
          </p>
        </>
      }
      cancelLabel={t('leaving:idle.stay')}
      confirm={{
        label: t('leaving:idle.signOut'),
        onConfirm: () => signOut.mutate(),
        busy: signOut.isPending,
      }}
    />
  );
}
