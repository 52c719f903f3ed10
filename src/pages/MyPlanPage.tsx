import { Dumbbell, Printer, Shield } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { MyPlan } from '#shared/plans/contract.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { Button } from '#src/components/Button.tsx';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { DoList } from '#src/features/plans/DoList.tsx';
import { HoldOffList } from '#src/features/plans/HoldOffList.tsx';
import { PhaseTrunk } from '#src/features/plans/PhaseTrunk.tsx';
import { PlanChanges } from '#src/features/plans/PlanChanges.tsx';
import { PlanFold } from '#src/features/plans/PlanFold.tsx';
import { useMyPlan } from '#src/features/plans/queries.ts';
import { useNowMs } from '#src/lib/now.ts';
import { formatDate } from '#src/lib/format.ts';

/** The whole plan by phase, with what is in force and what changed. */
export function MyPlanPage() {
  const { t } = useTranslation(['my-plan', 'plan', 'app']);
  const heading = usePageHeading(t('title'));
  const plan = useMyPlan();
  const { data } = plan;
  return (
    <div className="grid grid-cols-1 gap-6">
      <PageHeader title={t('title')} detail={data ? <Head plan={data} /> : undefined} headingRef={heading} />
      {data ? <Loaded plan={data} /> : null}
      {!data && plan.isError ? (
        <ErrorState
          title={t('failed.title')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void plan.refetch(),
            busy: plan.isFetching,
          }}
        >
          {t('failed.help')}
        </ErrorState>
      ) : null}
      {plan.isPending ? <LoadingState label={t('loading')} lines={8} /> : null}
    </div>
  );
}

function Head({ plan }: { plan: MyPlan }) {
  const { t } = useTranslation('my-plan');
  const { therapist, surgeon, procedure } = plan;
  return (
    <>
      {t('head', {
        arm: t(`arm.${plan.arm}`),
        procedure: t(`procedures.${procedure}`, { defaultValue: procedure }),
        date: formatDate(plan.surgeryDate),
      })}{' '}
      {therapist ? t('setBy', { therapist, surgeon }) : t('setBySurgeon', { surgeon })}
    </>
  );
}

function Loaded({ plan }: { plan: MyPlan }) {
  const { t } = useTranslation(['my-plan', 'plan']);
  const nowMs = useNowMs();
  return (
    <>
      <PhaseTrunk phases={plan.phases} nowMs={nowMs}>
        <PlanFold icon={Shield} title={t('holdOff', { count: plan.holdOff.length })}>
          {plan.holdOff.length > 0 ? (
            <HoldOffList items={plan.holdOff} therapist={plan.therapist} reasons />
          ) : (
            <p>{t('noneHeld')}</p>
          )}
        </PlanFold>
        <PlanFold icon={Dumbbell} title={t('exercises', { count: plan.exercises.length })}>
          {plan.exercises.length > 0 ? <DoList items={plan.exercises} steps /> : <p>{t('noExercises')}</p>}
        </PlanFold>
      </PhaseTrunk>
      <PlanChanges changes={plan.changes} />
      <div className="grid gap-4 print:hidden">
        <p className="text-sm text-ink-soft">{t('plan:notice')}</p>
        <div>
          <Button variant="outline" icon={Printer} onClick={() => window.print()}>
            {t('print')}
          </Button>
        </div>
      </div>
    </>
  );
}
