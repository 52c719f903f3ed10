import { ChevronDown, ChevronUp } from 'lucide-react';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { IconList } from '#src/components/IconList.tsx';
import { formatDate } from '#src/lib/format.ts';
import { precautionIcon } from './precaution-icons.ts';

type Props = {
  items: Today['holdOff'];
  therapist: string | null;
  /** Also says why, as on the plan. */
  reasons?: boolean;
  /** Shows so many and, on a press, the others; all of them where it is not given. */
  atFirst?: number;
};

/** What to hold off from, each until when it is looked at. It never says that one ends by itself. */
export function HoldOffList({ items, therapist, reasons = false, atFirst = items.length }: Props) {
  const { t } = useTranslation(['plan', 'today']);
  const { t: tCommon } = useTranslation();
  const decider = therapist ?? tCommon('yourTherapist');
  const [all, setAll] = useState(false);
  // One or two more are shown at once: a press for them would be a press for nothing.
  const long = items.length > atFirst + 2;
  return (
    <>
      <IconList
        items={(long && !all ? items.slice(0, atFirst) : items).map(
          ({ code, icon, usualWeek, usualDate, due }) => ({
            key: code,
            icon: precautionIcon(icon),
            title: t(`precautions.${code}.title`),
            detail: (
              <>
                {t(`precautions.${code}.detail`)}{' '}
                {reasons ? <>{t(`plan-details:precautions.${code}.why`)} </> : null}
                <span className={due ? 'font-bold text-ink' : undefined}>
                  {due
                    ? t('until.due', { therapist: decider })
                    : t('until.week', { week: usualWeek, date: formatDate(usualDate), therapist: decider })}
                </span>
              </>
            ),
          }),
        )}
      />
      {long ? (
        // It stays where it is, so that the focus is not lost with it.
        <Button
          variant="outline"
          block
          icon={all ? ChevronUp : ChevronDown}
          aria-expanded={all}
          onClick={() => setAll(!all)}
        >
          {all ? t('today:holdOff.fewer') : t('today:holdOff.more', { count: items.length - atFirst })}
        </Button>
      ) : null}
    </>
  );
}
