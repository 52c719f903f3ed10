import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { formatDate, localDateOf, telephoneHref } from '#src/lib/format.ts';
import { useRecord } from './caring.ts';
import { useMe } from './session.tsx';

/** Over every screen of a record that the clinic no longer watches: since when, and whom to call. */
export function NotWatched() {
  const { t } = useTranslation('record');
  const { clinic } = useMe();
  const { stateSince } = useRecord();
  return (
    <div className="mb-5">
      <Banner tone="warning" title={t('discharged.title')}>
        <p>
          {stateSince === null
            ? t('discharged.plain')
            : t('discharged.since', { date: formatDate(localDateOf(stateSince, clinic.timeZone)) })}{' '}
          {t('discharged.help', { number: clinic.emergencyNumber })}
        </p>
        <div className="mt-2">
          <LinkButton href={telephoneHref(clinic.phone)} variant="outline">
            {t('discharged.call', { phone: clinic.phone })}
          </LinkButton>
        </div>
      </Banner>
    </div>
  );
}
