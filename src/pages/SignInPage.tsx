import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate, useLocation, useSearchParams } from 'react-router-dom';
import { safePlace } from '#src/app/home.ts';
import { useSession } from '#src/app/session.tsx';
import { firstPlaceOf } from '#src/features/accounts/begin.ts';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { SecondStep } from '#src/features/accounts/SecondStep.tsx';
import type { PendingSignIn } from '#src/features/accounts/SecondStep.tsx';
import { SignInStart } from '#src/features/accounts/SignInStart.tsx';

const reasons = ['idle', 'ended', 'signed-out-elsewhere', 'reset'] as const;

function endedIn(state: unknown): (typeof reasons)[number] | undefined {
  const ended = typeof state === 'object' && state !== null && 'ended' in state ? state.ended : undefined;
  return reasons.find((reason) => reason === ended);
}

export function SignInPage() {
  const { t } = useTranslation('accounts');
  const location = useLocation();
  const [search] = useSearchParams();
  const me = useSession().data?.me;
  const [pending, setPending] = useState<PendingSignIn | null>(null);
  if (me) {
    const first = firstPlaceOf(me);
    const place = first === '/second-factor' ? null : safePlace(search.get('then'));
    return <Navigate to={place ?? first} replace />;
  }
  const ended = endedIn(location.state);
  return (
    <EntryFrame>
      {pending ? (
        <SecondStep pending={pending} onStartAgain={() => setPending(null)} />
      ) : (
        <SignInStart
          notice={ended ? t(`ended.${ended}`) : null}
          onStep={(step) => {
            if (step.next === 'second-factor') setPending(step);
          }}
        />
      )}
    </EntryFrame>
  );
}
