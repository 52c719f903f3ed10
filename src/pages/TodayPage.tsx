import type { TFunction } from 'i18next';
import { PauseCircle } from 'lucide-react';
import { lazy, Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { mayCheckIn, useRecord } from '#src/app/caring.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { carriedId } from '#src/app/record-choice.ts';
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
import { loadWords } from '#src/lib/i18n.ts';
import { useNowMs } from '#src/lib/now.ts';

/** For the few records that are not simply one's own and under way. Nobody else waits for it. */
const RecordNotice = lazy(async () => {
  const [module] = await Promise.all([import('#src/app/RecordNotice.tsx'), loadWords(['record'])]);
  return { default: module.RecordNotice };
});

/** Where am I, the check-in, what to hold off from, what to do. */
export function TodayPage() {
  const { t } = useTranslation('today');
  const heading = usePageHeading(t('title'));
  const nowMs = useNowMs();
  const me = useMe();
  const record = useRecord();
  const today = useToday();
  usePreparedCheckIn(mayCheckIn(record), async () => {
    await import('./CheckInPage.tsx');
  });
  const { data } = today;
  // Somebody who looks after the patient is greeted by their own name.
  const name = record.caring ? me.name.split(' ')[0] : data?.firstName;
  return (
    <>
      <PageHeader
        title={data ? t(`greeting.${partOfDay(nowMs)}`, { name }) : t('title')}
        detail={data ? dayWords(t, data) : undefined}
        headingRef={heading}
      />
      {data && (record.state !== 'active' || record.caring) ? (
        <Suspense>
          <RecordNotice surgeryDate={data.surgeryDate} />
        </Suspense>
      ) : null}
      {/* The plan begins with the surgery: before it there is nothing to hold off from. */}
      {data && record.state !== 'planned' ? <Loaded today={data} nowMs={nowMs} /> : null}
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

function dayWords(t: TFunction<'today'>, { day, arm }: Today): string {
  const where = t(`arm.${arm}`);
  return day < 0 ? where : t(day === 0 ? 'dayOfSurgery' : 'day', { day, arm: where });
}

function Loaded({ today, nowMs }: { today: Today; nowMs: number }) {
  const { t } = useTranslation(['today', 'plan']);
  const me = useMe();
  const record = useRecord();
  const side = useControlsSide();
  const loop = today.openFlag ? <FlagLoop flag={today.openFlag} clinic={me.clinic} nowMs={nowMs} /> : null;
  return (
    <div className="mt-4 grid grid-cols-1 gap-8">
      <div
        className={classNames(
          'grid grid-cols-1 gap-8 lg:flex lg:items-end lg:justify-between',
          side === 'left' && 'lg:flex-row-reverse',
        )}
      >
        <TodayStanding today={today} />
        {mayCheckIn(record) ? (
          <CheckInEntry
            doneAt={today.checkIns.todayAt}
            begun={{
              checkIn: hasDraft(me, carriedId(record), 'full', today.date),
              somethingNew: hasDraft(me, carriedId(record), 'something-new', today.date),
            }}
            side={side}
          >
            {loop}
          </CheckInEntry>
        ) : (
          loop
        )}
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
