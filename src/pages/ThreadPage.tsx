import { useTranslation } from 'react-i18next';
import { Navigate, useParams } from 'react-router-dom';
import { consequences } from '#shared/patients/states.ts';
import { useRecord } from '#src/app/caring.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { ThreadView } from '#src/features/threads/ThreadView.tsx';

/** One of a patient's threads; the thread brings the first heading. */
export function ThreadPage() {
  const { t } = useTranslation(['messages', 'record']);
  const { threadId } = useParams();
  // The subject stays out of the document's title, which other programs can read.
  usePageHeading(t('title'));
  const { clinic } = useMe();
  const { state } = useRecord();
  if (!threadId) return <Navigate to="/messages" replace />;
  const readOnly = consequences[state].threads ? undefined : t('record:readOnly', { phone: clinic.phone });
  return <ThreadView threadId={threadId} side="patient" readOnly={readOnly} />;
}
