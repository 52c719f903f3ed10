import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { IconList } from '#src/components/IconList.tsx';
import { formatDate } from '#src/lib/format.ts';
import { precautionIcon } from './precaution-icons.ts';

type Props = {
  items: Today['holdOff'];
  therapist: string | null;
  /** Also says why, as on the plan. */
  reasons?: boolean;
};

/** What to hold off from, each until when it is looked at. It never says that one ends by itself. */
export function HoldOffList({ items, therapist, reasons = false }: Props) {
  const { t } = useTranslation('plan');
  const { t: tCommon } = useTranslation();
  const decider = therapist ?? tCommon('yourTherapist');
  return (
    <IconList
      items={items.map(({ code, icon, usualWeek, usualDate, due }) => ({
        key: code,
        icon: precautionIcon(icon),
        title: t(`precautions.${code}.title`),
        detail: (
          <>
            {t(`precautions.${code}.detail`)} {reasons ? <>{t(`precautions.${code}.why`)} </> : null}
            <span className={due ? 'font-bold text-ink' : undefined}>
              {due
                ? t('until.due', { therapist: decider })
                : t('until.week', { week: usualWeek, date: formatDate(usualDate), therapist: decider })}
            </span>
          </>
        ),
      }))}
    />
  );
}
