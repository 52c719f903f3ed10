import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { CaregiverRow } from './CaregiverRow.tsx';
import { EndDialog } from './EndDialog.tsx';

type Props = {
  caregivers: readonly CaregiverCard[];
  onChange: (caregiverId: string) => void;
  onEnd: () => void;
};

/** Who helps now, and who no longer does. */
export function CaregiverList({ caregivers, onChange, onEnd }: Props) {
  const { t } = useTranslation('caregivers');
  const [ending, setEnding] = useState<CaregiverCard | null>(null);
  const parts = [
    { key: 'now', cards: caregivers.filter(({ endedAt }) => endedAt === null) },
    { key: 'past', cards: caregivers.filter(({ endedAt }) => endedAt !== null) },
  ];
  return (
    <>
      {parts
        .filter(({ cards }) => cards.length > 0)
        .map(({ key, cards }) => (
          <section key={key} aria-labelledby={`caregivers-${key}`}>
            <SectionHeading id={`caregivers-${key}`} wire>
              {t(key)}
            </SectionHeading>
            <ul>
              {cards.map((card) => (
                <CaregiverRow
                  key={card.id}
                  card={card}
                  onChange={() => onChange(card.id)}
                  onEnd={() => {
                    onEnd();
                    setEnding(card);
                  }}
                />
              ))}
            </ul>
          </section>
        ))}
      {ending ? <EndDialog card={ending} onClose={() => setEnding(null)} /> : null}
    </>
  );
}
