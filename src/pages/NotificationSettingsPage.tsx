import { useTranslation } from 'react-i18next';
import { AccountFrame } from '#src/app/AccountFrame.tsx';
import { usePageHeading } from '#src/app/page-heading.ts';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { NotificationScreen } from '#src/features/notifications/NotificationScreen.tsx';

/** A patient's or caregiver's own. */
export function NotificationSettingsPage() {
  const { t } = useTranslation('notifications');
  return (
    <AccountFrame title={t('title')} detail={t('detail')}>
      <NotificationScreen />
    </AccountFrame>
  );
}

/** The same inside the clinic's places. */
export function ClinicNotificationSettingsPage() {
  const { t } = useTranslation('notifications');
  const heading = usePageHeading(t('title'));
  return (
    <div className="mx-auto grid max-w-3xl gap-6 p-5">
      <PageHeader title={t('title')} headingRef={heading} />
      <NotificationScreen />
    </div>
  );
}
