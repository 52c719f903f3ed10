import type { TFunction } from 'i18next';
import { useTranslation } from 'react-i18next';
import { ApiProblem } from '#src/lib/problem.ts';

function waitSentence(t: TFunction<'accounts'>, seconds: number): string {
  return seconds < 100 ? t('wait', { count: seconds }) : t('waitMinutes', { count: Math.ceil(seconds / 60) });
}

/** Why the sign-in was refused, in one sentence; null where the fields say it, and before anything failed. */
export function useRefusal(error: Error | null): string | null {
  const { t } = useTranslation('accounts');
  if (!error) return null;
  if (!(error instanceof ApiProblem)) return t('unreachable');
  if (error.code === 'wrong-sign-in') return t('wrong');
  if (error.code === 'too-many-attempts' && error.body.retryAfter !== undefined) {
    return waitSentence(t, error.body.retryAfter);
  }
  return error.fieldErrors.length > 0 ? null : error.message;
}
