import { MessageSquare, Sunrise } from 'lucide-react';
import { Link, Outlet, useLocation } from 'react-router-dom';
import { Mark } from '#src/components/Mark.tsx';
import type { NavigationItem } from '#src/components/navigation.ts';
import { Rail } from '#src/components/Rail.tsx';
import { SkipLink } from '#src/components/SkipLink.tsx';
import { ToastProvider } from '#src/components/Toast.tsx';
import { Caution } from '#src/features/clinic/Caution.tsx';
import { WorkerBanner } from '#src/features/clinic/WorkerBanner.tsx';
import { useThreads } from '#src/features/threads/queries.ts';
import { FlagToasts } from '#src/features/triage/FlagToasts.tsx';
import { useMorningRound } from '#src/features/triage/queries.ts';
import { useMe } from '../session.tsx';
import { ClinicAccount } from './ClinicAccount.tsx';

const mainId = 'main';

/** Around the clinic's places: the rail, and over each of them what nobody may miss. */
export function ClinicShell() {
  const me = useMe();
  const toSee = useMorningRound().data?.flags.length ?? 0;
  const waiting = useThreads().data?.filter(({ state }) => state === 'waiting-on-us').length ?? 0;
  // The round tells of new flags itself, in its own place.
  const onRound = useLocation().pathname.startsWith('/round');
  const places: NavigationItem[] = [
    {
      to: '/round',
      label: 'Morning round',
      icon: Sunrise,
      badge: { count: toSee, label: `${toSee} to see` },
    },
    {
      to: '/clinic/messages',
      label: 'Messages',
      icon: MessageSquare,
      badge: { count: waiting, label: `${waiting} waiting on us` },
    },
  ];
  return (
    <ToastProvider label="News" closeLabel="Close">
      <div className="flex min-h-dvh flex-col lg:h-dvh lg:flex-row print:h-auto">
        <SkipLink targetId={mainId} label="Skip to the main part" />
        <Rail
          label="Places"
          menuLabel="Menu"
          items={places}
          head={
            <Link to="/round" className="inline-flex min-h-target items-center">
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
            <Outlet />
          </main>
          <footer className="border-t border-wire bg-paper px-5 py-3 text-xs text-ink-soft lg:hidden">
            <Caution />
          </footer>
        </div>
      </div>
      {onRound ? null : <FlagToasts />}
    </ToastProvider>
  );
}
