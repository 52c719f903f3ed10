import { lazy, Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import { useMe } from '#src/app/session.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { Devices } from './Devices.tsx';
import { useNotificationSettings } from './queries.ts';
import { Tests } from './Tests.tsx';

const SettingsForm = lazy(async () => ({ default: (await import('./SettingsForm.tsx')).SettingsForm }));

/** How somebody is reached: the same for patients, caregivers and staff; the kinds differ by role. */
export function NotificationScreen() {
  const { t } = useTranslation(['notifications', 'app', 'account']);
  const { patient } = useMe();
  const settings = useNotificationSettings();
  const { data } = settings;
  if (!data) {
    return settings.isError ? (
      <ErrorState
        title={t('account:loadFailed')}
        retry={{
          label: t('app:tryAgain'),
          onRetry: () => void settings.refetch(),
          busy: settings.isFetching,
        }}
      />
    ) : (
      <LoadingState label={t('app:loading')} lines={8} />
    );
  }
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-10">
      {data.emailBounced ? (
        <Banner tone="warning" title={t('bounced.title')}>
          {t('bounced.help', { email: data.email })}
        </Banner>
      ) : null}
      {data.missing.length > 0 ? (
        <Banner tone="warning" title={t('missing.title')}>
          {data.missing.map((what) => (
            <p key={what}>{t(`missing.${what}`)}</p>
          ))}
        </Banner>
      ) : null}
      <p>{t('neutral')}</p>
      <Suspense fallback={<LoadingState label={t('app:loading')} lines={8} />}>
        <SettingsForm settings={data} isPatient={patient !== null} />
      </Suspense>
      <Devices />
      <Tests settings={data} />
    </div>
  );
}
