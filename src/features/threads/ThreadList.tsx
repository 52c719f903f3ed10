import { MessageSquare } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { useThreads } from './queries.ts';
import { useRefusal } from './refusal.ts';
import type { Side } from './seen-mark.ts';
import { ThreadRow } from './ThreadRow.tsx';

type Props = {
  side: Side;
  /** The thread that is open beside the list. */
  selectedId?: string | null;
};

/** One's threads, in the order that the server gives: those that wait on us first. */
export function ThreadList({ side, selectedId = null }: Props) {
  const { t } = useTranslation(['threads', 'app']);
  const { data: threads, error, isFetching, refetch } = useThreads();
  const refusal = useRefusal(error);
  if (!threads) {
    // The rows bring their own space at the sides; beside them the clinic's list has none.
    return (
      <div className={side === 'clinic' ? 'px-5' : undefined}>
        {error ? (
          <ErrorState
            title={t('list.failed')}
            retry={{ label: t('app:tryAgain'), onRetry: () => void refetch(), busy: isFetching }}
          >
            {refusal}
          </ErrorState>
        ) : (
          <LoadingState label={t('list.loading')} lines={6} />
        )}
      </div>
    );
  }
  if (threads.length === 0) {
    return (
      <EmptyState icon={MessageSquare} title={t(`list.empty.${side}.title`)}>
        {t(`list.empty.${side}.body`)}
      </EmptyState>
    );
  }
  return (
    <ul aria-label={t('list.label')} className="border-t border-wire">
      {threads.map((thread) => (
        <ThreadRow key={thread.id} thread={thread} side={side} selected={thread.id === selectedId} />
      ))}
    </ul>
  );
}
