import { isAnswered } from '#shared/check-ins/answering.ts';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { Screen } from '#shared/check-ins/screens.ts';
import { nextScreen, screensFor } from '#shared/check-ins/walk.ts';
import type { CheckInDraft } from './draft.ts';

type Place = Pick<CheckInDraft, 'answers' | 'context' | 'mode'>;

/** The question of that name where these answers ask for it; else the first that has no answer yet. */
export function screenAt(place: Place, at: string): Screen | null {
  const screens = screensFor(place.answers, place.context, place.mode);
  return (
    screens.find(({ id }) => id === at) ??
    screens.find((screen) => !isAnswered(screen, place.answers)) ??
    screens.at(-1) ??
    null
  );
}

/**
 * Where an answer leads: to the next question, or, where one answer was changed from the review, to what that
 * change asks for and back to the review.
 */
export function stepAfter(place: Place, at: string, changing: boolean): string {
  const { answers, context, mode } = place;
  const next = nextScreen(at, answers, context, mode);
  if (!changing) return next?.id ?? at;
  const screens = screensFor(answers, context, mode);
  const after = screens.slice(screens.findIndex(({ id }) => id === at) + 1);
  return (after.find((screen) => !isAnswered(screen, answers)) ?? screens.at(-1))?.id ?? at;
}

/** The answers without that of one question, for undo. */
export function withoutAnswer(answers: Answers, screen: Screen): Answers {
  const rest: Answers = { ...answers };
  delete rest[screen.key];
  if ('alone' in screen && screen.alone.noneKey) delete rest[screen.alone.noneKey];
  return rest;
}

/** Questions that have no answer yet, before the review can be sent as a whole. */
export const unanswered = ({ answers, context, mode }: Place): Screen[] =>
  screensFor(answers, context, mode).filter((screen) => !isAnswered(screen, answers));
