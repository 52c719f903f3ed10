import { useTranslation } from 'react-i18next';
import { useRouteError } from 'react-router-dom';
import { ErrorState } from '#src/components/ErrorState.tsx';

/** The words with which the browsers say that a part of the application could not be fetched. */
const missingChunk =
  /dynamically imported module|importing a module script|unable to preload|failed to fetch/i;

/** Instead of a screen that could not be loaded or broke while it was drawn. */
export function ErrorPage() {
  const { t } = useTranslation();
  const error = useRouteError();
  const missing = error instanceof Error && missingChunk.test(error.message);
  const kind = missing ? (navigator.onLine ? 'updated' : 'offline') : 'crash';
  return (
    <main className="mx-auto max-w-3xl p-5">
      <ErrorState
        title={t(`failed.${kind}`)}
        retry={{ label: t('reload'), onRetry: () => window.location.reload() }}
      >
        {t(`failed.${kind}Help`)}
      </ErrorState>
    </main>
  );
}
