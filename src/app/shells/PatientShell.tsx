import { ListChecks, MessageSquare, Sprout } from 'lucide-react';
import { lazy, Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import { Link, Outlet } from 'react-router-dom';
import { BottomBar } from '#src/components/BottomBar.tsx';
import { BottomDock } from '#src/components/BottomDock.tsx';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { Mark } from '#src/components/Mark.tsx';
import { SkipLink } from '#src/components/SkipLink.tsx';
import type { NavigationItem } from '#src/components/navigation.ts';
import { useResumedAlerts } from '#src/features/check-ins/resume-alerts.ts';
import { useUnseenMessages } from '#src/features/plans/queries.ts';
import { telephoneHref } from '#src/lib/format.ts';
import { loadWords } from '#src/lib/i18n.ts';
import { useRecord } from '../caring.ts';
import { useMe } from '../session.tsx';
import { PatientMenu } from './PatientMenu.tsx';
import { SideNavigation } from './SideNavigation.tsx';

const mainId = 'main';

/** For the few whom the clinic no longer watches; the others do not wait for it. */
const NotWatched = lazy(async () => {
  const [module] = await Promise.all([import('../NotWatched.tsx'), loadWords(['record'])]);
  return { default: module.NotWatched };
});

/** Around the patient's places: the bar at the top, the places, and the emergency line at all times. */
export function PatientShell() {
  const { t } = useTranslation();
  const { clinic } = useMe();
  const { state, caring } = useRecord();
  const unseen = useUnseenMessages();
  useResumedAlerts();
  const places: NavigationItem[] = [
    { to: '/today', label: t('nav.today'), icon: Sprout },
    { to: '/plan', label: t('nav.plan'), icon: ListChecks },
  ];
  if (caring?.mayMessage !== false) {
    places.push({
      to: '/messages',
      label: t('nav.messages'),
      icon: MessageSquare,
      badge: { count: unseen, label: t('nav.unseen', { count: unseen }) },
    });
  }
  return (
    <div className="base-large flex min-h-dvh flex-col">
      <SkipLink targetId={mainId} label={t('skip')} />
      <header className="mx-auto flex w-full max-w-5xl items-center justify-between gap-3 px-5 pt-3 print:hidden">
        <div className="@container min-w-0 grow">
          <Link to="/today" className="inline-flex min-h-target items-center">
            <Mark />
          </Link>
        </div>
        <PatientMenu />
      </header>
      <div className="mx-auto grid w-full max-w-5xl grow grid-cols-1 content-start lg:grid-cols-[13rem_minmax(0,1fr)]">
        <SideNavigation label={t('places')} items={places} />
        <main id={mainId} tabIndex={-1} className="w-full max-w-3xl min-w-0 px-5 pt-3 pb-10">
          {state === 'discharged' || state === 'ended' ? (
            <Suspense>
              <NotWatched />
            </Suspense>
          ) : null}
          <Outlet />
        </main>
      </div>
      <BottomDock>
        <EmergencyLine label={t('emergency.label')} href={telephoneHref(clinic.emergencyNumber)}>
          {t('emergency.line', { number: clinic.emergencyNumber })}
        </EmergencyLine>
        <div className="lg:hidden">
          <BottomBar label={t('places')} items={places} />
        </div>
      </BottomDock>
    </div>
  );
}
