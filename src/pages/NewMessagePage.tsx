import { ArrowLeft } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { usePageHeading } from '#src/app/page-heading.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { NewThreadForm } from '#src/features/threads/NewThreadForm.tsx';

/** A patient's new message, which opens a thread. */
export function NewMessagePage() {
  const { t } = useTranslation(['messages', 'threads']);
  const heading = usePageHeading(t('newTitle'));
  return (
    <div className="grid gap-4">
      <div className="-ml-4">
        <LinkButton to="/messages" variant="quiet" icon={ArrowLeft}>
          {t('back')}
        </LinkButton>
      </div>
      <PageHeader title={t('newTitle')} detail={t('newDetail')} headingRef={heading} />
      <NewThreadForm />
    </div>
  );
}
