import { useTranslation } from 'react-i18next';
import { Banner } from '#src/components/Banner.tsx';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';
import { isProofNeeded } from './proof-needed.ts';

/**
 * Why something was not done, in plain words. Nothing where the fields say it, and where somebody closed the
 * question for a proof: they know that nothing was done.
 */
export function AccountRefused({ error }: { error: Error | null }) {
  const { t } = useTranslation('account');
  if (!error || isProofNeeded(error)) return null;
  if (error instanceof ApiProblem && error.fieldErrors.length > 0) return null;
  const reason =
    error instanceof ApiProblem
      ? error.message
      : t(error instanceof Unreachable ? 'refused.unreachable' : 'refused.unexpected');
  return (
    <Banner tone="warning" title={t('refused.title')} announce="alert">
      {reason}
    </Banner>
  );
}
