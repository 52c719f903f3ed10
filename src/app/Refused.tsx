import { Banner } from '#src/components/Banner.tsx';
import { ApiProblem } from '#src/lib/problem.ts';
import { refusalOf } from '#src/lib/refusal.ts';

/** Says why something was not done; nothing while there is nothing to say, or while the fields say it. */
export function Refused({ error }: { error: Error | null }) {
  if (!error || (error instanceof ApiProblem && error.fieldErrors.length > 0)) return null;
  const { title, detail } = refusalOf(error);
  return (
    <Banner tone="warning" title={title} announce="alert">
      {detail}
    </Banner>
  );
}
