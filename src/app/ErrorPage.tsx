import { useTranslation } from 'react-i18next';
import { useRouteError } from 'react-router-dom';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { telephoneHref } from '#src/lib/format.ts';
import { useSession } from './session.tsx';

/** The words with which the browsers say that a part of the application could not be fetched. */
const missingChunk = /imported module|module script|preload|to fetch/i;

/** Instead of a screen that could not be loaded or broke while it was drawn. */
export function ErrorPage() {
  const { t } = useTranslation();
  const error = useRouteError();
  const number = useSession().data?.me?.clinic.emergencyNumber;
  const missing = error instanceof Error && missingChunk.test(error.message);
  const kind = missing ? (navigator.onLine ? 'updated' : 'offline') : 'crash';
  return (
    <main className="mx-auto max-w-3xl p-5">
      {number ? (
        <EmergencyLine label={t('emergency.label')} href={telephoneHref(number)}>
          {t('emergency.line', { number })}
        </EmergencyLine>
      ) : null}
      <ErrorState
        title={t(`failed.${kind}`)}
        retry={{ label: t('reload'), onRetry: () => window.location.reload() }}
      >
        {t(`failed.${kind}Help`)}
      </ErrorState>
    </main>
  );
}
