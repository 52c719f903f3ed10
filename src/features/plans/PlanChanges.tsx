import { useTranslation } from 'react-i18next';
import type { MyPlan } from '#shared/plans/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatDate } from '#src/lib/format.ts';

/** What a clinician changed in the plan, who and when; the newest first, as the server gives it. */
export function PlanChanges({ changes }: { changes: MyPlan['changes'] }) {
  const { t } = useTranslation(['my-plan', 'plan']);
  return (
    <section aria-labelledby="changed">
      <SectionHeading id="changed" wire>
        {t('changed.title')}
      </SectionHeading>
      {changes.length === 0 ? <p className="py-2">{t('changed.none')}</p> : null}
      <ul className="grid gap-3 pt-2">
        {changes.map(({ on, kind, code, by }) => (
          <li key={`${on} ${kind} ${code}`} className="leading-snug">
            <p className="font-bold">
              {t(`changed.${kind}`, {
                date: formatDate(on),
                name: t(
                  kind === 'open-phase' ? `plan:phases.${code}.name` : `plan:precautions.${code}.title`,
                ),
              })}
            </p>
            <p className="text-sm text-ink-soft">{t('changed.by', { name: by })}</p>
          </li>
        ))}
      </ul>
    </section>
  );
}
