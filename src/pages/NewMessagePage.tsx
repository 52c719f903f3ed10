import { ArrowLeft } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { Navigate } from 'react-router-dom';
import { consequences } from '#shared/patients/states.ts';
import { useRecord } from '#src/app/caring.ts';
import { isClosed } from '#src/app/clinic-hours.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { NewThreadForm } from '#src/features/threads/NewThreadForm.tsx';
import { useNowMs } from '#src/lib/now.ts';

/** A patient's new message, which opens a thread. */
export function NewMessagePage() {
  const { t } = useTranslation(['messages', 'threads']);
  const heading = usePageHeading(t('newTitle'));
  const { clinic } = useMe();
  // While the clinic is closed the form says so with the hour of opening, and once is enough.
  const closed = isClosed(clinic, useNowMs());
  const { state } = useRecord();
  if (!consequences[state].threads) return <Navigate to="/messages" replace />;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <div className="-ml-4">
        <LinkButton to="/messages" variant="quiet" icon={ArrowLeft}>
          {t('back')}
        </LinkButton>
      </div>
      <PageHeader title={t('newTitle')} detail={closed ? undefined : t('newDetail')} headingRef={heading} />
      <NewThreadForm />
    </div>
  );
}
