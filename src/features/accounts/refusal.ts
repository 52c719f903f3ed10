import type { TFunction } from 'i18next';
import { useTranslation } from 'react-i18next';
import { isProofNeeded } from '#src/app/proof-needed.ts';
import { PasskeyTrouble } from '#src/lib/passkeys.ts';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';

/** What the same refusal means on one screen. */
type Meaning = {
  /** What a passkey was wanted for. */
  passkey?: 'use' | 'make' | 'add';
  wrongCode?: string;
  spent?: string;
};

function waitSentence(t: TFunction<'accounts'>, seconds: number): string {
  return seconds < 100 ? t('wait', { count: seconds }) : t('waitMinutes', { count: Math.ceil(seconds / 60) });
}

/**
 * Why something was refused, in one sentence; null where the fields say it, before anything failed, and where
 * the person closed the question for a proof.
 */
export function useRefusal(error: Error | null, { passkey = 'use', wrongCode, spent }: Meaning = {}) {
  const { t } = useTranslation('accounts');
  if (!error || isProofNeeded(error)) return null;
  if (error instanceof PasskeyTrouble) return t(`trouble.${passkey}.${error.kind}`);
  if (error instanceof Unreachable) return t('unreachable');
  if (!(error instanceof ApiProblem)) return t('unexpected');
  if (error.code === 'wrong-sign-in') return t('wrong');
  if (error.code === 'wrong-code' && wrongCode) return wrongCode;
  if (error.code === 'link-spent' && spent) return spent;
  if (error.code === 'too-many-attempts' && error.body.retryAfter !== undefined) {
    return waitSentence(t, error.body.retryAfter);
  }
  return error.fieldErrors.length > 0 ? null : error.message;
}

/** What the server says of one field; undefined where it says nothing of it. */
export const fieldErrorOf = (error: Error | null, field: string): string | undefined =>
  error instanceof ApiProblem
    ? error.fieldErrors.find((entry) => entry.field === field || entry.field.endsWith(`.${field}`))?.message
    : undefined;

export const isCode = (error: Error | null, ...codes: ApiProblem['code'][]): boolean =>
  error instanceof ApiProblem && codes.includes(error.code);
