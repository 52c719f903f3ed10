import { HeartHandshake, UserPlus } from 'lucide-react';
import { lazy, Suspense, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate } from 'react-router-dom';
import { AccountFrame } from '#src/app/AccountFrame.tsx';
import { useRecord } from '#src/app/caring.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { CaregiverList } from '#src/features/caregivers/CaregiverList.tsx';
import { useCaregivers } from '#src/features/caregivers/queries.ts';

const InviteForm = lazy(async () => ({
  default: (await import('#src/features/caregivers/CaregiverForm.tsx')).InviteForm,
}));
const ChangeForm = lazy(async () => ({
  default: (await import('#src/features/caregivers/CaregiverForm.tsx')).ChangeForm,
}));

/** What the page is at: the list, the form for somebody new, or the one for somebody in the list. */
type Doing = { kind: 'list'; said: string | null } | { kind: 'invite' } | { kind: 'change'; id: string };

/** Whom the patient has let in, and what they may do. Only the patient decides that. */
export function CaregiversPage() {
  const { t } = useTranslation(['caregivers', 'app', 'account']);
  const { caring } = useRecord();
  const caregivers = useCaregivers(caring === null);
  const [doing, setDoing] = useState<Doing>({ kind: 'list', said: null });
  if (caring) return <Navigate to="/account" replace />;
  const { data } = caregivers;
  const toList = (said: string | null = null) => setDoing({ kind: 'list', said });
  const card = doing.kind === 'change' ? data?.find(({ id }) => id === doing.id) : undefined;
  return (
    <AccountFrame title={t('title')} detail={t('detail')}>
      <Suspense fallback={<LoadingState label={t('app:loading')} />}>
        {doing.kind === 'invite' ? <InviteForm onDone={toList} onCancel={() => toList()} /> : null}
        {card ? <ChangeForm key={card.id} card={card} onDone={toList} onCancel={() => toList()} /> : null}
      </Suspense>
      <div role="status" className="empty:hidden">
        {doing.kind === 'list' && doing.said ? <Banner>{doing.said}</Banner> : null}
      </div>
      {doing.kind === 'list' ? (
        <>
          {data?.length === 0 ? (
            <EmptyState icon={HeartHandshake} title={t('empty.title')}>
              {t('empty.body')}
            </EmptyState>
          ) : null}
          {data ? (
            <>
              <CaregiverList
                caregivers={data}
                onChange={(id) => setDoing({ kind: 'change', id })}
                onEnd={() => toList()}
              />
              <div>
                <Button size="large" icon={UserPlus} onClick={() => setDoing({ kind: 'invite' })}>
                  {t('invite')}
                </Button>
              </div>
            </>
          ) : caregivers.isError ? (
            <ErrorState
              title={t('account:loadFailed')}
              retry={{
                label: t('app:tryAgain'),
                onRetry: () => void caregivers.refetch(),
                busy: caregivers.isFetching,
              }}
            />
          ) : (
            <LoadingState label={t('loading')} lines={6} />
          )}
        </>
      ) : null}
    </AccountFrame>
  );
}
