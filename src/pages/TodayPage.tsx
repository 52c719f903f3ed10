import { PauseCircle } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { useMe } from '#src/app/session.tsx';
import { Banner } from '#src/components/Banner.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { classNames } from '#src/components/class-names.ts';
import { CheckInEntry } from '#src/features/check-ins/CheckInEntry.tsx';
import { FlagLoop } from '#src/features/check-ins/FlagLoop.tsx';
import { hasDraft } from '#src/features/check-ins/kept.ts';
import { usePreparedCheckIn } from '#src/features/check-ins/context-query.ts';
import { DoList } from '#src/features/plans/DoList.tsx';
import { HoldOffList } from '#src/features/plans/HoldOffList.tsx';
import { partOfDay } from '#src/features/plans/part-of-day.ts';
import { useToday } from '#src/features/plans/queries.ts';
import { TodayStanding } from '#src/features/plans/TodayStanding.tsx';
import { useNowMs } from '#src/lib/now.ts';

/** Where am I, the check-in, what to hold off from, what to do. */
export function TodayPage() {
  const { t } = useTranslation('today');
  const heading = usePageHeading(t('title'));
  const nowMs = useNowMs();
  const today = useToday();
  usePreparedCheckIn(async () => {
    await import('./CheckInPage.tsx');
  });
  const { data } = today;
  return (
    <>
      <PageHeader
        title={data ? t(`greeting.${partOfDay(nowMs)}`, { name: data.firstName }) : t('title')}
        detail={
          data
            ? t(data.day === 0 ? 'dayOfSurgery' : 'day', { day: data.day, arm: t(`arm.${data.arm}`) })
            : undefined
        }
        headingRef={heading}
      />
      {data ? <Loaded today={data} nowMs={nowMs} /> : null}
      {!data && today.isError ? (
        <ErrorState
          title={t('failed.title')}
          retry={{
            label: t('tryAgain', { ns: 'app' }),
            onRetry: () => void today.refetch(),
            busy: today.isFetching,
          }}
        >
          {t('failed.help')}
        </ErrorState>
      ) : null}
      {today.isPending ? <LoadingState label={t('loading', { ns: 'app' })} lines={8} /> : null}
    </>
  );
}

function Loaded({ today, nowMs }: { today: Today; nowMs: number }) {
  const { t } = useTranslation(['today', 'plan']);
  const me = useMe();
  const side = useControlsSide();
  return (
    <div className="mt-4 grid grid-cols-1 gap-8">
      <div
        className={classNames(
          'grid grid-cols-1 gap-8 lg:flex lg:items-end lg:justify-between',
          side === 'left' && 'lg:flex-row-reverse',
        )}
      >
        <TodayStanding today={today} />
        <CheckInEntry
          doneAt={today.checkIns.todayAt}
          begun={{
            checkIn: hasDraft(me, 'full', today.date),
            somethingNew: hasDraft(me, 'something-new', today.date),
          }}
          side={side}
        >
          {today.openFlag ? <FlagLoop flag={today.openFlag} clinic={me.clinic} nowMs={nowMs} /> : null}
        </CheckInEntry>
      </div>
      <section aria-labelledby="hold-off">
        <SectionHeading id="hold-off" wire>
          {t('holdOff.title')}
        </SectionHeading>
        {today.holdOff.length > 0 ? (
          <HoldOffList items={today.holdOff} therapist={today.therapist} atFirst={6} />
        ) : (
          <p className="py-2">{t('holdOff.none')}</p>
        )}
      </section>
      <section aria-labelledby="do">
        <SectionHeading id="do" wire>
          {t('do.title')}
        </SectionHeading>
        {today.paused ? (
          <div className="pt-2">
            <Banner tone="warning" icon={PauseCircle} title={t('paused.title')}>
              {t(`paused.${today.paused}`)}
            </Banner>
          </div>
        ) : null}
        <DoToday today={today} />
      </section>
      <p className="text-sm text-ink-soft">{t('plan:notice')}</p>
    </div>
  );
}

function DoToday({ today: { exercises, paused } }: { today: Today }) {
  const { t } = useTranslation('today');
  if (exercises.length > 0 && paused !== 'all') return <DoList items={exercises} />;
  return paused ? null : <p className="py-2">{t('do.none')}</p>;
}
