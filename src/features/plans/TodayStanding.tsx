import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { formatDate } from '#src/lib/format.ts';
import { Trellis } from './Trellis.tsx';

/** Where am I: the trellis and what it says in words. */
export function TodayStanding({ today }: { today: Today }) {
  const { t } = useTranslation(['today', 'plan']);
  const { trellis, day, checkIns } = today;
  const phaseName = t(`plan:phases.${today.phase.code}.name`);
  const missed = trellis.days.filter(({ kind }) => kind === 'missed').length;
  const flagged = trellis.days.filter(({ kind }) => kind === 'flagged').length;
  const review = trellis.review
    ? t('review', { week: trellis.review.week, date: formatDate(trellis.review.date) })
    : undefined;
  return (
    <div className="min-w-0 grow">
      <Trellis
        size="large"
        data={{
          ...trellis,
          phases: trellis.phases.map((phase) => ({ ...phase, name: t(`plan:phases.${phase.code}.name`) })),
        }}
        label={[
          t('trellis.phase', { phase: phaseName, day }),
          t('trellis.checkIns', { count: checkIns.done }),
          t('trellis.missed', { count: missed }),
          t('trellis.flagged', { count: flagged }),
          review ?? '',
        ].join(' ')}
        reviewLabel={review}
      />
      <p className="mt-3">
        <strong>{t('phase', { phase: phaseName })}</strong> <ReviewWords today={today} />{' '}
        {checkIns.of > 0 ? t('checkInsSoFar', { done: checkIns.done, of: checkIns.of }) : null}
      </p>
    </div>
  );
}

function ReviewWords({ today: { trellis, day } }: { today: Today }) {
  const { t } = useTranslation('today');
  if (!trellis.review) return null;
  const { week, day: reviewDay } = trellis.review;
  if (reviewDay > day) return t('toReview', { count: reviewDay - day, week });
  return t(reviewDay === day ? 'reviewToday' : 'reviewDue', { week });
}
