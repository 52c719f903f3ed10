import type { Answers } from './answers.ts';
import { holds, type AskContext, type CheckInMode, type Choice, type Screen } from './screens.ts';
import { tree } from './tree.ts';

/** The precaution that is asked about by the sling's own choices and not again in the hold-off list. */
const slingCode = 'sling';

const precautionsToAsk = (context: AskContext): string[] =>
  context.precautionsInForce.filter((code) => code !== slingCode);

const isAsked = (screen: Screen, answers: Answers, context: AskContext, mode: CheckInMode): boolean =>
  !(screen.fullOnly && mode === 'something-new') &&
  !(screen.needsPrecautions && context.precautionsInForce.length === 0) &&
  screen.when.every((condition) => holds(condition, answers));

/** The screens that these answers ask for, in order. */
export const screensFor = (answers: Answers, context: AskContext, mode: CheckInMode): Screen[] =>
  tree.filter((screen) => isAsked(screen, answers, context, mode));

/** The screen after the current one, the first one for null; null after the last. */
export const nextScreen = (
  currentId: string | null,
  answers: Answers,
  context: AskContext,
  mode: CheckInMode,
): Screen | null => {
  const from = tree.findIndex((screen) => screen.id === currentId);
  return tree.slice(from + 1).find((screen) => isAsked(screen, answers, context, mode)) ?? null;
};

/** The screen before the current one, for "back"; null on the first. */
export const previousScreen = (
  currentId: string,
  answers: Answers,
  context: AskContext,
  mode: CheckInMode,
): Screen | null => {
  const before = tree.slice(
    0,
    tree.findIndex((screen) => screen.id === currentId),
  );
  return before.findLast((screen) => isAsked(screen, answers, context, mode)) ?? null;
};

/** What a list offers to this person on this day. */
export const choicesFor = (choices: readonly Choice[], context: AskContext): Choice[] =>
  choices.filter(
    ({ code, fromWeek, needsPrecaution }) =>
      (fromWeek === undefined || Math.floor(context.day / 7) >= fromWeek) &&
      (needsPrecaution === undefined || context.precautionsInForce.includes(needsPrecaution)) &&
      (code !== 'held-off' || precautionsToAsk(context).length > 0),
  );

/** The hold-off list as choices, in the words of the plan for what was done. */
export const precautionChoices = (context: AskContext): Choice[] =>
  precautionsToAsk(context).map((code) => ({ code, textKey: `plan-details:precautions.${code}.did` }));

/** Estimated seconds from the current screen to the end, in steps of five as it is shown; never nothing. */
export const secondsLeft = (
  currentId: string,
  answers: Answers,
  context: AskContext,
  mode: CheckInMode,
): number => {
  const screens = screensFor(answers, context, mode);
  const left = screens.slice(
    Math.max(
      0,
      screens.findIndex((screen) => screen.id === currentId),
    ),
  );
  const seconds = left.reduce((sum, screen) => sum + screen.seconds, 0);
  return Math.max(5, Math.round(seconds / 5) * 5);
};
