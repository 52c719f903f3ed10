import { Trans, useTranslation } from 'react-i18next';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import { isClosed } from '#src/app/clinic-hours.ts';
import { Banner } from '#src/components/Banner.tsx';
import { formatTime, formatWeekday, localDateOf, telephoneHref } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';

/** "Tue 08:00": always with the day, since "08:00" alone could be read as today. */
const openingWords = (opensAt: string, timeZone: string): string =>
  `${formatWeekday(localDateOf(opensAt, timeZone)).slice(0, 3)} ${formatTime(opensAt, timeZone)}`;

/** Says before anything is sent that nobody watches now; nothing while the clinic is open. */
export function OutOfHours({ clinic }: { clinic: ClinicCard }) {
  const { t } = useTranslation('threads');
  const nowMs = useNowMs();
  const { opensAt, timeZone, onCallNumber } = clinic;
  if (!isClosed(clinic, nowMs)) return null;
  return (
    <Banner tone="warning">
      {opensAt === null
        ? t('hours.closed')
        : t('hours.closedUntil', { opening: openingWords(opensAt, timeZone) })}{' '}
      <Trans
        t={t}
        i18nKey="hours.call"
        values={{ number: onCallNumber }}
        components={{
          call: (
            // The words come from the translation; the link must not be empty for the linter's eyes.
            <a
              href={telephoneHref(onCallNumber)}
              className="font-bold whitespace-nowrap underline underline-offset-3"
            >
              {onCallNumber}
            </a>
          ),
        }}
      />
    </Banner>
  );
}
