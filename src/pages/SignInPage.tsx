import { useTranslation } from 'react-i18next';
import { Navigate, useLocation, useSearchParams } from 'react-router-dom';
import { homeOf, safePlace } from '#src/app/home.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useSession } from '#src/app/session.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { Mark } from '#src/components/Mark.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { SignInForm } from '#src/features/accounts/SignInForm.tsx';
import { SignInTree } from '#src/features/accounts/SignInTree.tsx';
import { useSignInPage } from '#src/features/accounts/queries.ts';
import { telephoneHref } from '#src/lib/format.ts';

const reasons = ['idle', 'ended', 'signed-out-elsewhere'] as const;

function endedIn(state: unknown): (typeof reasons)[number] | undefined {
  const ended = typeof state === 'object' && state !== null && 'ended' in state ? state.ended : undefined;
  return reasons.find((reason) => reason === ended);
}

export function SignInPage() {
  const { t } = useTranslation('accounts');
  const heading = usePageHeading(t('title'));
  const location = useLocation();
  const [search] = useSearchParams();
  const me = useSession().data?.me;
  const clinic = useSignInPage().data?.clinic ?? null;
  if (me) return <Navigate to={safePlace(search.get('then')) ?? homeOf(me.roles)} replace />;
  const ended = endedIn(location.state);
  return (
    <div className="base-large grid min-h-dvh lg:grid-cols-2">
      <main className="grid content-center px-5 py-8 sm:px-10">
        <div className="mx-auto grid w-full max-w-[25rem] gap-8 lg:gap-12">
          <Mark />
          <div className="grid gap-5">
            <PageHeader title={t('title')} detail={clinic?.name} headingRef={heading} />
            {ended ? <Banner announce="status">{t(`ended.${ended}`)}</Banner> : null}
            <SignInForm />
          </div>
          <p className="text-sm text-ink-soft">
            {clinic ? (
              <a href={telephoneHref(clinic.emergencyNumber)} className="underline underline-offset-4">
                {t('emergency', { number: clinic.emergencyNumber })}
              </a>
            ) : (
              t('emergencyAnywhere')
            )}
          </p>
        </div>
      </main>
      <div aria-hidden className="hidden place-items-center bg-leaf-wash p-12 lg:grid">
        <SignInTree month={new Date().getMonth() + 1} />
      </div>
    </div>
  );
}
