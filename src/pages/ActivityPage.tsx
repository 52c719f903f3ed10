import { Eye } from 'lucide-react';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate } from 'react-router-dom';
import { AccountFrame } from '#src/app/AccountFrame.tsx';
import { useRecord } from '#src/app/caring.ts';
import { Button } from '#src/components/Button.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { ActivityDays } from '#src/features/activity/ActivityDays.tsx';
import { useActivity } from '#src/features/activity/queries.ts';
import { useNowMs } from '#src/lib/now.ts';

/** Who opened the patient's record, and when, and why where it was outside the care team. */
export function ActivityPage() {
  const { t } = useTranslation(['activity', 'app', 'account']);
  const { caring } = useRecord();
  const [withOwn, setWithOwn] = useState(false);
  const activity = useActivity(caring === null, withOwn);
  const nowMs = useNowMs();
  if (caring) return <Navigate to="/account" replace />;
  const lines = activity.data?.pages.flatMap((page) => page.lines);
  return (
    <AccountFrame title={t('title')} detail={t('detail')}>
      <Checkbox
        label={t('withOwn')}
        checked={withOwn}
        onChange={(event) => setWithOwn(event.target.checked)}
      />
      {lines ? <ActivityDays lines={lines} nowMs={nowMs} /> : null}
      {lines?.length === 0 ? <EmptyState icon={Eye} title={t('empty')} /> : null}
      {activity.isError ? (
        <ErrorState
          title={t('account:loadFailed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void (lines ? activity.fetchNextPage() : activity.refetch()),
            busy: activity.isFetching,
          }}
        />
      ) : null}
      {activity.isPending ? <LoadingState label={t('loading')} lines={8} /> : null}
      {activity.hasNextPage && !activity.isError ? (
        <div>
          <Button
            variant="outline"
            busy={activity.isFetchingNextPage}
            onClick={() => void activity.fetchNextPage()}
          >
            {t('more')}
          </Button>
        </div>
      ) : null}
    </AccountFrame>
  );
}
