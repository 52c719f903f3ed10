import { ArrowLeft } from 'lucide-react';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { usePageHeading } from './page-heading.ts';

type Props = { title: string; detail?: string; children: ReactNode };

/** A page below one's account: the way back, the heading, and what the page is for. */
export function AccountFrame({ title, detail, children }: Props) {
  const { t } = useTranslation('account');
  const heading = usePageHeading(title);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-6">
      <div className="grid grid-cols-[minmax(0,1fr)] gap-1">
        <div className="-ml-4">
          <LinkButton to="/account" variant="quiet" icon={ArrowLeft}>
            {t('back')}
          </LinkButton>
        </div>
        <PageHeader title={title} detail={detail} headingRef={heading} />
      </div>
      {children}
    </div>
  );
}
