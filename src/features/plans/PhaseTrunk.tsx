import type { TFunction } from 'i18next';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import type { MyPlan } from '#shared/plans/contract.ts';
import { classNames } from '#src/components/class-names.ts';
import { formatDate, localDateOf } from '#src/lib/format.ts';

type Phase = MyPlan['phases'][number];

type Props = {
  phases: readonly Phase[];
  nowMs: number;
  /** What belongs to the phase that one is in. */
  children: ReactNode;
};

/** The phases as a trunk: those behind, the one that is open, and those that a clinician will open. */
export function PhaseTrunk({ phases, nowMs, children }: Props) {
  const { t, i18n } = useTranslation(['my-plan', 'plan', 'plan-details']);
  const date = localDateOf(nowMs);
  return (
    <ol className="grid grid-cols-1">
      {phases.map((phase, index) => (
        <li
          key={phase.code}
          className="relative grid grid-cols-1 pb-7 pl-9 last:pb-0"
          aria-current={phase.current ? 'step' : undefined}
        >
          {index < phases.length - 1 ? (
            <span
              aria-hidden
              className="absolute top-2 bottom-[-0.4rem] left-[0.5625rem] w-1 bg-bark opacity-45 forced-colors:bg-[CanvasText]"
            />
          ) : null}
          <span
            aria-hidden
            className={classNames(
              'absolute top-1.5 left-0 size-5.5 rounded-full border-[3px]',
              phase.openedOn ? 'border-leaf bg-leaf' : 'border-bark bg-paper',
              !phase.current && phase.openedOn && 'opacity-60',
            )}
          />
          <h2 className="text-xl leading-snug">
            {t(`plan:phases.${phase.code}.name`)}{' '}
            <span className="text-base font-normal text-ink-soft">{whenWords(t, phase, date)}</span>
          </h2>
          <p className="mt-1 text-ink-soft">
            {phase.current || phase.openedOn || !i18n.exists(`plan-details:phases.${phase.code}.opens`)
              ? t(`plan-details:phases.${phase.code}.goal`)
              : t(`plan-details:phases.${phase.code}.opens`)}
          </p>
          {phase.current ? <div className="mt-2">{children}</div> : null}
        </li>
      ))}
    </ol>
  );
}

function whenWords(
  t: TFunction<readonly ['my-plan', 'plan', 'plan-details']>,
  phase: Phase,
  date: string,
): string {
  const { current, openedOn, usualStartWeek, usualEndWeek, usualEndDate } = phase;
  if (current) {
    if (usualEndDate === null) return t('now');
    return t(usualEndDate < date ? 'reviewDue' : 'nowTo', { date: formatDate(usualEndDate) });
  }
  if (openedOn !== null) return t('done', { date: formatDate(openedOn) });
  return usualEndWeek === null
    ? t('fromWeek', { from: usualStartWeek })
    : t('weeks', { from: usualStartWeek, to: usualEndWeek });
}
