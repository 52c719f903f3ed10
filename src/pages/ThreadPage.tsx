import { useTranslation } from 'react-i18next';
import { Navigate, useParams } from 'react-router-dom';
import { usePageHeading } from '#src/app/page-heading.ts';
import { ThreadView } from '#src/features/threads/ThreadView.tsx';

/** One of a patient's threads; the thread brings the first heading. */
export function ThreadPage() {
  const { t } = useTranslation('messages');
  const { threadId } = useParams();
  // The subject stays out of the document's title, which other programs can read.
  usePageHeading(t('title'));
  return threadId ? <ThreadView threadId={threadId} side="patient" /> : <Navigate to="/messages" replace />;
}
