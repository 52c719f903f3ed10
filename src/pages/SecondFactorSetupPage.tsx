import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate, useNavigate } from 'react-router-dom';
import { sessionQuery, useMe } from '#src/app/session.tsx';
import { useSignOut } from '#src/app/sign-out.ts';
import { Button } from '#src/components/Button.tsx';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { SecondFactorSteps } from '#src/features/accounts/SecondFactorSteps.tsx';

/** `/second-factor`: the only place there is for staff who have none yet. */
export function SecondFactorSetupPage() {
  const { t } = useTranslation();
  const me = useMe();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const signOut = useSignOut();
  // As it was on arrival: once it is set up, the recovery codes still have to be kept.
  const [needed] = useState(me.secondFactor === 'missing');
  if (!needed) return <Navigate to="/" replace />;
  return (
    <EntryFrame>
      <SecondFactorSteps
        onDone={async () => {
          await queryClient.refetchQueries(sessionQuery);
          await navigate('/', { replace: true });
        }}
        wayOut={
          <>
            <Button variant="quiet" busy={signOut.isPending} onClick={() => signOut.mutate()}>
              {t('account.signOut')}
            </Button>
            <p role="alert" className="px-4 font-bold text-clay empty:hidden">
              {signOut.isError ? t('leaving:signingOut.failed') : null}
            </p>
          </>
        }
      />
    </EntryFrame>
  );
}
