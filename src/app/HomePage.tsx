import { Navigate } from 'react-router-dom';
import { homeOf } from './home.ts';
import { useSession } from './session.tsx';
import { Splash } from './Splash.tsx';

/** `/`: takes each person to the first screen of their role. */
export function HomePage() {
  const session = useSession();
  if (session.isPending) return <Splash />;
  // Where the session could not be asked for, Today's own guard says so and offers another try.
  const roles = session.data?.me?.roles;
  return <Navigate to={roles ? homeOf(roles) : session.isError ? '/today' : '/sign-in'} replace />;
}
