import type { Answers, Temperature } from './answers.ts';
import { holds, type AskContext, type CheckInMode, type Screen, type TickScreen } from './screens.ts';
import { tree } from './tree.ts';
import { screensFor } from './walk.ts';

const listKeys = ['sling', 'heldOff', 'danger', 'symptoms', 'popSigns', 'fallSigns', 'woundSigns'] as const;
/** The codes that exclude the others in their list; they go when something else is ticked. */
const aloneCodes: readonly string[] = ['none', 'as-advised', 'not-sure'];

/**
 * Drops the answers to questions that are no longer asked, such as the signs of a fall once the fall is
 * unticked, and "none of these" beside something that is ticked.
 */
export const pruneAnswers = (answers: Answers): Answers => {
  const kept: Record<string, unknown> = { ...answers };
  for (const { key } of tree) {
    const askers = tree.filter((screen) => screen.key === key);
    const asked = askers.some(({ when }) => when.every((condition) => holds(condition, answers)));
    if (!asked) delete kept[key];
  }
  for (const key of listKeys) {
    const codes = kept[key];
    if (!Array.isArray(codes)) continue;
    const ticked = codes.filter((code: string) => !aloneCodes.includes(code));
    if (ticked.length > 0) kept[key] = ticked;
    else if (codes.length === 0) delete kept[key];
  }
  if (kept.danger !== undefined) delete kept.dangerNone;
  if (kept.symptoms !== undefined) delete kept.symptomsNone;
  return kept;
};

/** Answers a scale, a single choice or a temperature. */
export const choose = (screen: Screen, answers: Answers, value: number | string | Temperature): Answers =>
  pruneAnswers({ ...answers, [screen.key]: value });

/** What is ticked in a list, without "none of these" and its like. */
export const tickedIn = (screen: TickScreen, answers: Answers): string[] =>
  (answers[screen.key] ?? []).filter((code) => code !== screen.alone.code);

/** Ticks or unticks one line of a list. Ticking it takes "none of these" back. */
export const toggle = (screen: TickScreen, answers: Answers, code: string): Answers => {
  const ticked = tickedIn(screen, answers);
  const next = ticked.includes(code) ? ticked.filter((other) => other !== code) : [...ticked, code];
  return pruneAnswers({ ...answers, [screen.key]: next });
};

/** "None of these", "as advised": refused, the answers unchanged, while something in the list is ticked. */
export const chooseAlone = (screen: TickScreen, answers: Answers): Answers => {
  if (tickedIn(screen, answers).length > 0) return answers;
  const { code, noneKey } = screen.alone;
  return pruneAnswers({ ...answers, [noneKey ?? screen.key]: noneKey ? true : [code] });
};

/** Whether the screen has its answer. The note never has to be written. */
export const isAnswered = (screen: Screen, answers: Answers): boolean => {
  if (screen.kind === 'note') return true;
  if ('alone' in screen && screen.alone.noneKey && answers[screen.alone.noneKey]) return true;
  const answer = answers[screen.key];
  return Array.isArray(answer) ? answer.length > 0 : answer !== undefined;
};

/** Whether every question that these answers ask for is answered. Sending does not depend on it. */
export const isComplete = (answers: Answers, context: AskContext, mode: CheckInMode): boolean =>
  screensFor(answers, context, mode).every((screen) => isAnswered(screen, answers));
