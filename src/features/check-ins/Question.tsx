import { useTranslation } from 'react-i18next';
import { choose, chooseAlone, tickedIn, toggle } from '#shared/check-ins/answering.ts';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInContext } from '#shared/check-ins/contract.ts';
import type { Choice, Screen, TickScreen } from '#shared/check-ins/screens.ts';
import { choicesFor, precautionChoices } from '#shared/check-ins/walk.ts';
import { CheckTile } from '#src/components/CheckTile.tsx';
import { ChoiceTile } from '#src/components/ChoiceTile.tsx';
import { NumberGrid } from '#src/components/NumberGrid.tsx';
import { AloneButton } from './AloneButton.tsx';
import { SymptomTiles } from './SymptomTiles.tsx';
import { TemperatureQuestion } from './TemperatureQuestion.tsx';

type Props = {
  screen: Exclude<Screen, { kind: 'note' }>;
  /** The question in words, which names the group of answers. */
  label: string;
  answers: Answers;
  context: CheckInContext;
  side: 'left' | 'right';
  /** `advance` where one press is the whole answer. */
  onAnswer: (answers: Answers, advance: boolean) => void;
};

/** The answers of one question, by its kind. Nothing is ever picked beforehand. */
export function Question({ screen, label, answers, context, side, onAnswer }: Props) {
  const { t } = useTranslation(['check-in-screens', 'check-in', 'plan-details']);
  switch (screen.kind) {
    case 'scale':
      return (
        <NumberGrid
          label={label}
          value={answers[screen.key] ?? null}
          onPick={(value) => onAnswer(choose(screen, answers, value), true)}
          towards={side}
          anchors={{ lowest: t('pain.lowest'), highest: t('pain.highest') }}
        />
      );
    case 'single':
      return (
        <div role="group" aria-label={label} className="grid gap-2.5">
          {choicesFor(screen.choices, context).map(({ code, textKey, hintKey }) => (
            <ChoiceTile
              key={code}
              label={t(textKey)}
              detail={hintKey ? t(hintKey) : undefined}
              picked={answers[screen.key] === code}
              onClick={() => onAnswer(choose(screen, answers, code), true)}
            />
          ))}
        </div>
      );
    case 'temperature':
      return (
        <TemperatureQuestion
          answer={answers.temperature}
          side={side}
          onAnswer={(value) => onAnswer(choose(screen, answers, value), true)}
        />
      );
    case 'tiles':
      return (
        <SymptomTiles screen={screen} label={label} answers={answers} context={context} onAnswer={onAnswer} />
      );
    case 'several':
      return (
        <Ticks
          screen={screen}
          label={label}
          choices={choicesFor(screen.choices, context)}
          answers={answers}
          onAnswer={onAnswer}
        />
      );
    case 'precautions':
      return (
        <Ticks
          screen={screen}
          label={label}
          choices={precautionChoices(context)}
          answers={answers}
          onAnswer={onAnswer}
        />
      );
  }
}

type TicksProps = Pick<Props, 'label' | 'answers' | 'onAnswer'> & {
  screen: TickScreen;
  choices: readonly Choice[];
};

function Ticks({ screen, label, choices, answers, onAnswer }: TicksProps) {
  const { t } = useTranslation(['check-in-screens', 'check-in', 'plan-details']);
  const ticked = tickedIn(screen, answers);
  const alone = (
    <AloneButton
      alone={screen.alone}
      picked={isAlonePicked(screen, answers)}
      disabled={ticked.length > 0}
      onPick={() => onAnswer(chooseAlone(screen, answers), true)}
    />
  );
  return (
    <div role="group" aria-label={label} className="grid gap-2">
      {screen.alone.place === 'first' ? alone : null}
      {choices.map(({ code, textKey }) => (
        <CheckTile
          key={code}
          label={t(textKey)}
          checked={ticked.includes(code)}
          onChange={() => onAnswer(toggle(screen, answers, code), false)}
        />
      ))}
      {screen.alone.place === 'last' ? alone : null}
    </div>
  );
}

function isAlonePicked({ alone, key }: TickScreen, answers: Answers): boolean {
  if (alone.noneKey) return answers[alone.noneKey] === true;
  const answer: readonly string[] = answers[key] ?? [];
  return answer.includes(alone.code);
}
