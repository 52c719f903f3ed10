import { SquarePen } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { consequences } from '#shared/patients/states.ts';
import { useRecord } from '#src/app/caring.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { classNames } from '#src/components/class-names.ts';
import { ThreadList } from '#src/features/threads/ThreadList.tsx';

/** A patient's threads, and the way to a new one. */
export function MessagesPage() {
  const { t } = useTranslation(['messages', 'threads']);
  const heading = usePageHeading(t('title'));
  const side = useControlsSide();
  const { state } = useRecord();
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-5">
      <PageHeader
        title={t('title')}
        detail={consequences[state].threads ? t('detail') : undefined}
        headingRef={heading}
      />
      {consequences[state].threads ? (
        <div className={classNames('grid sm:w-80', side === 'right' && 'sm:ml-auto')}>
          <LinkButton to="/messages/new" size="large" block icon={SquarePen}>
            {t('new')}
          </LinkButton>
        </div>
      ) : null}
      <ThreadList side="patient" />
    </div>
  );
}
