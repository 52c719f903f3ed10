import { lazy, Suspense, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import type { Role } from '#shared/access/permissions.ts';
import { ErrorState } from '#src/components/ErrorState.tsx';
import { useIsScreenHeld } from './caution-hold.ts';
import { homeOf } from './home.ts';
import { MeContext, useSession } from './session.tsx';
import { Splash } from './Splash.tsx';

/** It watches; nothing waits for it, so it comes after the screen. */
const SessionGuard = lazy(async () => ({ default: (await import('./SessionGuard.tsx')).SessionGuard }));

const secondFactorPath = '/second-factor';

type Props = { anyOf: readonly Role[] };

/** Lets through whoever holds one of the roles; sends others to sign in, or to their own first screen. */
export function RequireRole({ anyOf }: Props) {
  const { t } = useTranslation();
  const location = useLocation();
  const session = useSession();
  const held = useIsScreenHeld();
  const signedIn = session.data?.me ?? null;
  const [last, setLast] = useState(signedIn);
  if (signedIn && signedIn !== last) setLast(signedIn);
  const me = signedIn ?? (held ? last : null);

  if (!me && session.isPending) return <Splash />;
  if (!me && session.data === undefined) {
    return (
      <main className="base-large mx-auto max-w-3xl p-5">
        <ErrorState
          title={t('failed.session')}
          retry={{
            label: t('tryAgain'),
            onRetry: () => void session.refetch(),
            busy: session.isFetching,
          }}
        >
          {t('failed.sessionHelp')}
        </ErrorState>
      </main>
    );
  }
  if (!me) {
    const place = `${location.pathname}${location.search}`;
    const search = place === '/' ? '' : `?then=${encodeURIComponent(place)}`;
    return <Navigate to={`/sign-in${search}`} state={{ ended: session.data?.ended }} replace />;
  }
  // Staff may do nothing but set up their second factor until they have one.
  if (me.secondFactor === 'missing' && location.pathname !== secondFactorPath) {
    return <Navigate to={secondFactorPath} replace />;
  }
  if (!me.roles.some((role) => anyOf.includes(role))) return <Navigate to={homeOf(me.roles)} replace />;
  return (
    <MeContext value={me}>
      <Outlet />
      <Suspense>
        <SessionGuard me={me} />
      </Suspense>
    </MeContext>
  );
}
