import { useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { Answers, Temperature } from '#shared/check-ins/answers.ts';
import { Button } from '#src/components/Button.tsx';
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
  return (
    <div className="grid gap-5">
      <ChoiceTile
        label={t('check-in:temperature.not-measured')}
        picked={answer === 'not-measured'}
        onClick={() => onAnswer('not-measured')}
      />
      {degrees === null ? (
        <>
          <div role="group" aria-label={t('temperature.unit')} className="grid grid-cols-2 gap-2.5">
            {(['F', 'C'] as const).map((code) => (
              <ChoiceTile
                key={code}
                label={`°${code}`}
                picked={unit === code}
                onClick={() => setUnit(code)}
              />
            ))}
          </div>
          <NumberGrid
            label={t('temperature.degrees')}
            {...degreesOf[unit]}
            value={null}
            onPick={setDegrees}
            towards={side}
          />
        </>
      ) : (
        <Tenths
          degrees={degrees}
          unit={unit}
          picked={measured?.unit === unit && Math.floor(measured.tenths / 10) === degrees ? measured : null}
          side={side}
          onPick={(tenths) => onAnswer({ unit, tenths: degrees * 10 + tenths })}
          onOther={() => setDegrees(null)}
        />
      )}
    </div>
  );
}

type TenthsProps = {
  degrees: number;
  unit: Unit;
  picked: Temperature | null;
  side: 'left' | 'right';
  onPick: (tenths: number) => void;
  onOther: () => void;
};

/** The second press, in the place of the first, so that nothing has to be scrolled to. */
function Tenths({ degrees, unit, picked, side, onPick, onOther }: TenthsProps) {
  const { t } = useTranslation('check-in-screens');
  const heading = useRef<HTMLHeadingElement>(null);
  // The grid that held the focus has gone.
  useEffect(() => heading.current?.focus({ preventScroll: true }), []);
  const title = `${t('temperature.tenths', { degrees })} (°${unit})`;
  return (
    <section className="grid gap-3">
      <h2 ref={heading} tabIndex={-1} className="text-lg">
        {title}
      </h2>
      <NumberGrid
        label={title}
        min={0}
        max={9}
        value={picked ? picked.tenths % 10 : null}
        onPick={onPick}
        towards={side}
      />
      <div>
        <Button variant="outline" onClick={onOther}>
          {t('temperature.other')}
        </Button>
      </div>
    </section>
  );
}
