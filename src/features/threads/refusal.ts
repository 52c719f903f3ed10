import { useTranslation } from 'react-i18next';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';

/** Why something was not done, in one sentence; null before anything failed. */
export function useRefusal(error: Error | null): string | null {
  const { t } = useTranslation('threads');
  if (!error) return null;
  if (error instanceof Unreachable) return t('composer.unreachable');
  if (!(error instanceof ApiProblem)) return t('composer.unexpected');
  return error.fieldErrors[0]?.message ?? error.message;
}
