import { BellRing } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { Today } from '#shared/plans/contract.ts';
import { isClosed } from '#src/app/clinic-hours.ts';
import { formatMoment, telephoneHref } from '#src/lib/format.ts';

type Props = { flag: NonNullable<Today['openFlag']>; clinic: ClinicCard; nowMs: number };

/** What became of what the patient told: recorded facts only, and nothing that is merely likely. */
export function FlagLoop({ flag, clinic, nowMs }: Props) {
  const { t } = useTranslation('today');
  const { raisedAt, seenBy, seenAt, claimedBy } = flag;
  const read =
    seenBy !== null && seenAt !== null
      ? t('loop.read', { name: seenBy, time: formatMoment(seenAt, nowMs) })
      : t('loop.unread');
  return (
    <section aria-labelledby="loop" className="flex gap-3 rounded bg-bark-wash px-4 py-3.5">
      <BellRing className="mt-0.5 size-6 shrink-0 text-bark" aria-hidden />
      <div className="grid min-w-0 grow grid-cols-1 gap-1 leading-snug">
        <h2 id="loop" className="text-base">
          {t('loop.title')}
        </h2>
        <p role="status">
          {t('loop.sent', { time: formatMoment(raisedAt, nowMs) })} {read}{' '}
          {claimedBy !== null ? t('loop.claimed', { name: claimedBy }) : null}
        </p>
        {seenBy === null && isClosed(clinic, nowMs) && clinic.opensAt !== null ? (
          <p>
            <a
              href={telephoneHref(clinic.onCallNumber)}
              className="inline-block py-2 underline underline-offset-4"
            >
              {t('loop.closed', { time: formatMoment(clinic.opensAt, nowMs) })}{' '}
              <span className="whitespace-nowrap">{clinic.onCallNumber}</span>
            </a>
          </p>
        ) : null}
        <p className="text-sm text-ink-soft">{t('loop.worse')}</p>
      </div>
    </section>
  );
}
