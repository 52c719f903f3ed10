import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { LoadingState } from '#src/components/LoadingState.tsx';
import { EntryStep } from './EntryStep.tsx';
import { InvitationSteps } from './InvitationSteps.tsx';
import { useInvitation } from './invitation-queries.ts';
import type { SeenInvitation } from './invitation-queries.ts';
import { LostInvitation } from './LostInvitation.tsx';
import { isCode, useRefusal } from './refusal.ts';

/** What the link of a mail opens. */
export function InvitationByLink({ token, somebodyHere }: { token: string; somebodyHere: boolean }) {
  const { t } = useTranslation(['accounts', 'app']);
  // Kept here as well: whoever accepts begins a session, and that empties the cache under this screen.
  const [kept, setKept] = useState<SeenInvitation | null>(null);
  const seen = useInvitation({ token }, kept === null);
  const refusal = useRefusal(seen.error);
  if (seen.data && !kept) setKept(seen.data);
  if (kept) return <InvitationSteps invitation={{ token }} seen={kept} somebodyHere={somebodyHere} />;
  if (isCode(seen.error, 'link-spent', 'not-found', 'invalid-input')) return <LostInvitation why="unknown" />;
  return (
    <EntryStep title={t('invitation.document')}>
      {seen.isError ? (
        <ErrorState
          title={t('invitation.failed')}
          retry={{
            label: t('app:tryAgain'),
            onRetry: () => void seen.refetch(),
            busy: seen.isFetching,
          }}
        >
          {refusal}
        </ErrorState>
      ) : (
        <LoadingState label={t('loading')} />
      )}
    </EntryStep>
  );
}
