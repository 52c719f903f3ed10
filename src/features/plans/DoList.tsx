import { Repeat } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { Today } from '#shared/plans/contract.ts';
import { IconList } from '#src/components/IconList.tsx';
import { dosageWords } from './dosage.ts';

type Props = {
  items: Today['exercises'];
  /** Also says how, as on the plan. */
  steps?: boolean;
};

/** The exercises with their dosage. */
export function DoList({ items, steps = false }: Props) {
  const { t } = useTranslation('plan');
  return (
    <IconList
      items={items.map((exercise) => ({
        key: exercise.code,
        icon: Repeat,
        title: t(`exercises.${exercise.code}.name`),
        detail: (
          <>
            <span className="block">{dosageWords(t, exercise)}</span>
            {steps ? (
              <span className="mt-1 block">{t(`plan-details:exercises.${exercise.code}.steps`)}</span>
            ) : null}
          </>
        ),
      }))}
    />
  );
}
