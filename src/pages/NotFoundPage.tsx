import { useTranslation } from 'react-i18next';
import { usePageHeading } from '#src/app/page-heading.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';

export function NotFoundPage() {
  const { t } = useTranslation('nowhere');
  const heading = usePageHeading(t('notFound.title'));
  return (
    <main className="mx-auto grid max-w-3xl justify-items-start gap-5 p-5">
      <PageHeader title={t('notFound.title')} detail={t('notFound.body')} headingRef={heading} />
      <LinkButton to="/" variant="outline">
        {t('notFound.home')}
      </LinkButton>
    </main>
  );
}
