import type { RouteObject } from 'react-router-dom';
import { clinicianRoles } from '#shared/access/permissions.ts';
import type { Permission } from '#shared/access/permissions.ts';
import { RequireRole } from './app/RequireRole.tsx';
import { screen } from './app/screen.ts';

/** What a person of the clinic must hold to be at an address; the clinic's shell reads it. */
const needs = (permission: Permission) => ({ permission });

/** The addresses of the clinic. Each screen is a chunk of its own. */
export const clinicRoutes: RouteObject[] = [
  {
    element: <RequireRole anyOf={[...clinicianRoles, 'administrator']} />,
    children: [
      {
        path: '/letters/:invitationId',
        lazy: screen(async () => (await import('./pages/InvitationLetterPage.tsx')).InvitationLetterPage),
      },
      {
        path: '/letters/:invitationId/phone',
        lazy: screen(async () => (await import('./pages/InvitationLetterPage.tsx')).InvitationPhonePage),
      },
      {
        lazy: screen(async () => (await import('./app/shells/ClinicShell.tsx')).ClinicShell),
        children: [
          {
            path: '/round/:flagId?',
            handle: needs('flag:read'),
            lazy: screen(async () => (await import('./pages/MorningRoundPage.tsx')).MorningRoundPage),
          },
          {
            path: '/clinic/account/sign-in',
            lazy: screen(async () => (await import('./pages/WaysInPage.tsx')).ClinicWaysInPage, ['accounts']),
          },
          {
            path: '/caseload',
            handle: needs('patient:list'),
            lazy: screen(async () => (await import('./pages/CaseloadPage.tsx')).CaseloadPage),
          },
          {
            path: '/caseload/new',
            handle: needs('patient:write'),
            lazy: screen(async () => (await import('./pages/EnrolPatientPage.tsx')).EnrolPatientPage),
          },
          {
            path: '/caseload/import',
            handle: needs('patient:write'),
            lazy: screen(async () => (await import('./pages/ImportPatientsPage.tsx')).ImportPatientsPage),
          },
          {
            path: '/caseload/:patientId',
            handle: needs('patient:read'),
            lazy: screen(async () => (await import('./pages/PatientRecordPage.tsx')).PatientRecordPage),
          },
          {
            path: '/caseload/:patientId/edit',
            handle: needs('patient:write'),
            lazy: screen(async () => (await import('./pages/EditPatientPage.tsx')).EditPatientPage),
          },
          {
            path: '/clinic/people',
            handle: needs('person:manage'),
            lazy: screen(async () => (await import('./pages/PeoplePage.tsx')).PeoplePage),
          },
          {
            path: '/clinic/people/:personId',
            handle: needs('person:manage'),
            lazy: screen(async () => (await import('./pages/PersonPage.tsx')).PersonPage),
          },
          {
            path: '/clinic/confirmations',
            handle: needs('two-person:decide'),
            lazy: screen(async () => (await import('./pages/TwoPersonActsPage.tsx')).TwoPersonActsPage),
          },
          {
            path: '/clinic/deliveries',
            handle: needs('delivery:manage'),
            lazy: screen(async () => (await import('./pages/DeliveriesPage.tsx')).DeliveriesPage),
          },
          {
            path: '/clinic/account/notifications',
            lazy: screen(
              async () =>
                (await import('./pages/NotificationSettingsPage.tsx')).ClinicNotificationSettingsPage,
              ['account', 'notifications'],
            ),
          },
          {
            path: '/clinic/messages/:threadId?',
            handle: needs('thread:read'),
            lazy: screen(
              async () => (await import('./pages/ClinicMessagesPage.tsx')).ClinicMessagesPage,
              ['threads'],
            ),
          },
        ],
      },
    ],
  },
];
