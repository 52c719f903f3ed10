import { useTranslation } from 'react-i18next';
import { LoadingState } from '#src/components/LoadingState.tsx';

/** Before it is known who is signed in, or while a screen's code is on its way. */
export function Splash() {
  const { t } = useTranslation();
  return (
    <main className="mx-auto max-w-3xl p-5">
      <LoadingState label={t('loading')} />
    </main>
  );
}
