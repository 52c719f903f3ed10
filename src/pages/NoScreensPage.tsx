import { LogOut } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useSignOut } from '#src/app/sign-out.ts';
import { Button } from '#src/components/Button.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';

/** For roles whose screens are not there yet: says so, and lets them sign out. */
export function NoScreensPage() {
  const { t } = useTranslation(['app', 'nowhere', 'leaving']);
  const heading = usePageHeading(t('nowhere:noScreens.title'));
  const signOut = useSignOut();
  return (
    <main className="mx-auto grid max-w-3xl justify-items-start gap-5 p-5">
      <PageHeader
        title={t('nowhere:noScreens.title')}
        detail={t('nowhere:noScreens.body')}
        headingRef={heading}
      />
      <Button variant="outline" icon={LogOut} busy={signOut.isPending} onClick={() => signOut.mutate()}>
        {t('account.signOut')}
      </Button>
      {signOut.isError ? <p role="alert">{t('leaving:signingOut.failed')}</p> : null}
    </main>
  );
}
