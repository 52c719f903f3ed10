import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { Answers, Temperature } from '#shared/check-ins/answers.ts';
import { ChoiceTile } from '#src/components/ChoiceTile.tsx';
import { NumberGrid } from '#src/components/NumberGrid.tsx';

type Unit = Temperature['unit'];

/** The whole degrees that a thermometer shows of a living person; what is beyond is a slip of the finger. */
const degreesOf: Record<Unit, { min: number; max: number }> = {
  F: { min: 94, max: 107 },
  C: { min: 34, max: 42 },
};

/** The unit is a setting and no answer, so it may stand beforehand: °F where the device is set to the States. */
const usualUnit = (): Unit => (/-US\b/i.test(navigator.language) ? 'F' : 'C');

type Props = {
  answer: Answers['temperature'];
  side: 'left' | 'right';
  onAnswer: (value: Temperature | 'not-measured') => void;
};

/** A number by two presses, whole degrees and then tenths, so that nothing has to be typed. */
export function TemperatureQuestion({ answer, side, onAnswer }: Props) {
  const { t } = useTranslation(['check-in-screens', 'check-in']);
  const measured = typeof answer === 'object' ? answer : null;
  const [unit, setUnit] = useState<Unit>(() => measured?.unit ?? usualUnit());
  const [degrees, setDegrees] = useState(measured ? Math.floor(measured.tenths / 10) : null);
  function changeUnit(next: Unit) {
    setUnit(next);
    if (next !== unit) setDegrees(null);
  }
  return (
    <div className="grid gap-5">
      <ChoiceTile
        label={t('check-in:temperature.not-measured')}
        picked={answer === 'not-measured'}
        onClick={() => onAnswer('not-measured')}
      />
      <div role="group" aria-label={t('temperature.unit')} className="grid grid-cols-2 gap-2.5">
        {(['F', 'C'] as const).map((code) => (
          <ChoiceTile key={code} label={`°${code}`} picked={unit === code} onClick={() => changeUnit(code)} />
        ))}
      </div>
      <NumberGrid
        label={t('temperature.degrees')}
        {...degreesOf[unit]}
        value={degrees}
        onPick={setDegrees}
        towards={side}
      />
      {degrees !== null ? (
        <section className="grid gap-2" aria-live="polite">
          <h2 className="text-lg">{t('temperature.tenths', { degrees })}</h2>
          <NumberGrid
            label={t('temperature.tenths', { degrees })}
            min={0}
            max={9}
            value={
              measured && measured.unit === unit && Math.floor(measured.tenths / 10) === degrees
                ? measured.tenths % 10
                : null
            }
            onPick={(tenths) => onAnswer({ unit, tenths: degrees * 10 + tenths })}
            towards={side}
          />
        </section>
      ) : null}
    </div>
  );
}
