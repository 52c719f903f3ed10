import { Link, Navigate, Outlet, useLocation } from 'react-router-dom';
import { may } from '#shared/access/permissions.ts';
import { Mark } from '#src/components/Mark.tsx';
import { Rail } from '#src/components/Rail.tsx';
import { SkipLink } from '#src/components/SkipLink.tsx';
import { ToastProvider } from '#src/components/Toast.tsx';
import { Caution } from '#src/features/clinic/Caution.tsx';
import { WorkerBanner } from '#src/features/clinic/WorkerBanner.tsx';
import { FlagToasts } from '#src/features/triage/FlagToasts.tsx';
import { homeOf } from '../home.ts';
import { useMe } from '../session.tsx';
import { ClinicAccount } from './ClinicAccount.tsx';
import { useClinicRail } from './clinic-rail.ts';
import { useMayBeHere } from './place-permission.ts';

const mainId = 'main';

/** Around the clinic's places: the rail, and over each of them what nobody may miss. */
export function ClinicShell() {
  const me = useMe();
  const places = useClinicRail(me.roles, me.personId);
  const mayBeHere = useMayBeHere(me.roles);
  const home = homeOf(me.roles);
  // The round tells of new flags itself, in its own place.
  const onRound = useLocation().pathname.startsWith('/round');
  return (
    <ToastProvider label="News" closeLabel="Close">
      <div className="flex min-h-dvh flex-col lg:h-dvh lg:flex-row print:h-auto">
        <SkipLink targetId={mainId} label="Skip to the main part" />
        <Rail
          label="Places"
          menuLabel="Menu"
          items={places}
          head={
            <Link to={home} className="inline-flex min-h-target items-center">
              <Mark />
            </Link>
          }
          foot={
            <div className="grid gap-4">
              <div className="text-xs max-lg:hidden">
                <Caution />
              </div>
              <ClinicAccount me={me} />
            </div>
          }
        />
        <div className="flex min-w-0 grow flex-col lg:min-h-0">
          <WorkerBanner clinic={me.clinic} />
          <main
            id={mainId}
            tabIndex={-1}
            className="@container/clinic min-w-0 grow bg-sheet lg:min-h-0 lg:overflow-y-auto print:overflow-visible"
          >
            {mayBeHere ? <Outlet /> : <Navigate to={home} replace />}
          </main>
          <footer className="border-t border-wire bg-paper px-5 py-3 text-xs text-ink-soft lg:hidden">
            <Caution />
          </footer>
        </div>
      </div>
      {may(me.roles, 'flag:read') && !onRound ? <FlagToasts /> : null}
    </ToastProvider>
  );
}
