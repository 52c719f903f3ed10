import type { TFunction } from 'i18next';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInContext } from '#shared/check-ins/contract.ts';
import type { Choice, Screen } from '#shared/check-ins/screens.ts';
import { sinceLastCheckIn } from '#shared/check-ins/since.ts';
import { precautionChoices } from '#shared/check-ins/walk.ts';
import { formatDate, formatWeekday } from '#src/lib/format.ts';

type T = TFunction<readonly ['check-in-screens', 'check-in', 'plan-details']>;

/** "since Friday", "since surgery". */
function sinceWords(t: T, { lastCheckInDate, date }: CheckInContext): string {
  const since = sinceLastCheckIn(lastCheckInDate, date);
  return t(
    since.key,
    since.date === null ? {} : { day: formatWeekday(since.date), date: formatDate(since.date) },
  );
}

export const questionWords = (t: T, screen: Screen, context: CheckInContext): string =>
  t(screen.titleKey, { since: sinceWords(t, context) });

/** "98.6 °F". */
function temperatureWords(t: T, { unit, tenths }: { unit: 'C' | 'F'; tenths: number }): string {
  return t('temperature.value', {
    degrees: Math.floor(tenths / 10),
    tenths: tenths % 10,
    unit: `°${unit}`,
  });
}

function choicesOf(screen: Screen, context: CheckInContext): readonly Choice[] {
  if (screen.kind === 'tiles') return screen.tiles.flatMap(({ choices }) => choices);
  if (screen.kind === 'precautions') return precautionChoices(context);
  return 'choices' in screen ? screen.choices : [];
}

/** The answer of one question in words; null where there is none. */
export function answerWords(t: T, screen: Screen, answers: Answers, context: CheckInContext): string | null {
  if ('alone' in screen && screen.alone.noneKey && answers[screen.alone.noneKey]) {
    return t(screen.alone.textKey);
  }
  const answer = answers[screen.key];
  if (answer === undefined) return null;
  if (typeof answer === 'number') return String(answer);
  if (answer === 'not-measured') return t('check-in:temperature.not-measured');
  if (typeof answer === 'object' && !Array.isArray(answer)) return temperatureWords(t, answer);
  if (screen.kind === 'note') return answer.toString();
  const choices = choicesOf(screen, context);
  const wordsOf = (code: string) => {
    if ('alone' in screen && code === screen.alone.code) return t(screen.alone.textKey);
    const choice = choices.find((candidate) => candidate.code === code);
    return choice ? t(choice.textKey) : code;
  };
  return Array.isArray(answer) ? answer.map(wordsOf).join('; ') : wordsOf(String(answer));
}

/** An answered pain beside the person's own usual, rounded for show; null for other questions. */
export function usualWords(t: T, screen: Screen, answers: Answers, { usual }: CheckInContext): string | null {
  if (screen.kind !== 'scale') return null;
  const value = answers[screen.key];
  if (value === undefined) return null;
  const usualValue = usual[screen.key];
  if (usualValue === null) return t('check-in:usual.none', { value });
  const rounded = Math.round(usualValue);
  const side = value === rounded ? 'same' : value > rounded ? 'above' : 'below';
  return t(`check-in:usual.${side}`, { value, usual: rounded });
}
