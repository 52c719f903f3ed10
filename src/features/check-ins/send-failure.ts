import type { Screen } from '#shared/check-ins/screens.ts';
import { tree } from '#shared/check-ins/tree.ts';
import { ApiProblem } from '#src/lib/problem.ts';

/** Why a check-in could not be sent, and the question to go to where one was not accepted. */
export type SendFailure =
  | { kind: 'unreachable' }
  | { kind: 'invalid'; message: string; screen: Screen | null }
  | { kind: 'already-sent' }
  | { kind: 'refused'; reason: string };

/** A field is a path in the body: `answers.painNow`, `answers.danger.0`. */
const screenOfField = (field: string): Screen | null =>
  tree.find(({ key }) => field === `answers.${key}` || field.startsWith(`answers.${key}.`)) ?? null;

export function sendFailureOf(error: Error): SendFailure {
  if (!(error instanceof ApiProblem)) return { kind: 'unreachable' };
  if (error.code === 'id-conflict') return { kind: 'already-sent' };
  const first = error.fieldErrors[0];
  if (error.code === 'invalid-input' && first) {
    return { kind: 'invalid', message: first.message, screen: screenOfField(first.field) };
  }
  return { kind: 'refused', reason: error.message };
}
