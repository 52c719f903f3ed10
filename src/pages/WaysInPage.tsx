import { useTranslation } from 'react-i18next';
import { isStaff } from '#shared/access/permissions.ts';
import { AccountFrame } from '#src/app/AccountFrame.tsx';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { AuthenticatorSection } from '#src/features/accounts/AuthenticatorSection.tsx';
import { DevicesSection } from '#src/features/accounts/DevicesSection.tsx';
import { EmailSection } from '#src/features/accounts/EmailSection.tsx';
import { PasskeysSection } from '#src/features/accounts/PasskeysSection.tsx';
import { PasswordSection } from '#src/features/accounts/PasswordSection.tsx';
import { useWaysIn } from '#src/features/accounts/ways-in-queries.ts';

/** `/account/sign-in`, a patient's or caregiver's own: how one gets in, and where one is. */
export function WaysInPage() {
  const { t } = useTranslation('accounts');
  return (
    <AccountFrame title={t('waysIn.title')} detail={t('waysIn.lead')}>
      <WaysIn />
    </AccountFrame>
  );
}

/** `/clinic/account/sign-in`: the same inside the clinic's places. */
export function ClinicWaysInPage() {
  const { t } = useTranslation('accounts');
  const heading = usePageHeading(t('waysIn.title'));
  return (
    <div className="mx-auto grid max-w-3xl grid-cols-[minmax(0,1fr)] gap-6 px-6 py-6">
      <PageHeader title={t('waysIn.title')} detail={t('waysIn.lead')} headingRef={heading} />
      <WaysIn />
    </div>
  );
}

function WaysIn() {
  const { t } = useTranslation(['accounts', 'app']);
  const staff = isStaff(useMe().roles);
  const waysIn = useWaysIn();
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-8">
      {waysIn.data ? (
        <>
          <PasskeysSection waysIn={waysIn.data} />
          <PasswordSection waysIn={waysIn.data} />
          <EmailSection waysIn={waysIn.data} />
          {/* Patients need none; whoever has one all the same must be able to see and remove it. */}
          {staff || waysIn.data.authenticator ? <AuthenticatorSection waysIn={waysIn.data} /> : null}
        </>
      ) : waysIn.isError ? (
        <ErrorState
          title={t('waysIn.failed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void waysIn.refetch(),
            busy: waysIn.isFetching,
          }}
        />
      ) : (
        <LoadingState label={t('loading')} />
      )}
      <DevicesSection />
    </div>
  );
}
