import type { Route } from './http/route.ts';
import { accountRoutes } from './features/accounts/routes.ts';
import { activityRoutes } from './features/activity/routes.ts';
import { caregiverRoutes } from './features/caregivers/routes.ts';
import { checkInRoutes } from './features/check-ins/routes.ts';
import { clinicRoutes } from './features/clinic/routes.ts';
import { patientRoutes } from './features/patients/routes.ts';
import { invitationRoutes } from './features/people/invitation-routes.ts';
import { peopleRoutes } from './features/people/routes.ts';
import { planRoutes } from './features/plans/routes.ts';
import { threadRoutes } from './features/threads/routes.ts';
import { triageRoutes } from './features/triage/routes.ts';
import { pushRoutes } from './notifications/push-routes.ts';
import { notificationRoutes } from './notifications/routes.ts';

/** Every route of the API. What lies outside the clinics' fence is handed in. */
export const allRoutes = (lastBeat: () => Promise<Date | null>): Route[] => [
  ...accountRoutes,
  ...clinicRoutes(lastBeat),
  ...planRoutes,
  ...checkInRoutes,
  ...triageRoutes,
  ...threadRoutes,
  ...peopleRoutes,
  ...invitationRoutes,
  ...patientRoutes,
  ...caregiverRoutes,
  ...activityRoutes,
  ...notificationRoutes,
  ...pushRoutes,
];
