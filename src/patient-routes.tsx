import type { RouteObject } from 'react-router-dom';
import { RequireMessages } from './app/RequireMessages.tsx';
import { screen } from './app/screen.ts';

/** Whose page somebody wants to see. */
export const caringRoutes: RouteObject[] = [
  {
    path: '/caring',
    lazy: screen(async () => (await import('./pages/CaringPage.tsx')).CaringPage, ['caring', 'leaving']),
  },
];

/** What belongs to a patient's or caregiver's account. Each screen is a chunk of its own. */
const accountRoutes: RouteObject[] = [
  {
    path: '/account',
    lazy: screen(async () => (await import('./pages/AccountPage.tsx')).AccountPage, ['account', 'leaving']),
  },
  {
    path: '/account/sign-in',
    lazy: screen(async () => (await import('./pages/WaysInPage.tsx')).WaysInPage, ['account', 'accounts']),
  },
  {
    path: '/account/notifications',
    lazy: screen(
      async () => (await import('./pages/NotificationSettingsPage.tsx')).NotificationSettingsPage,
      ['account', 'notifications'],
    ),
  },
  {
    path: '/account/caregivers',
    lazy: screen(
      async () => (await import('./pages/CaregiversPage.tsx')).CaregiversPage,
      ['account', 'caregivers'],
    ),
  },
  {
    path: '/account/activity',
    lazy: screen(
      async () => (await import('./pages/ActivityPage.tsx')).ActivityPage,
      ['account', 'activity'],
    ),
  },
];

/** A patient's messages. Each screen is a chunk of its own. */
const messageRoutes: RouteObject[] = [
  {
    element: <RequireMessages />,
    children: [
      {
        path: '/messages',
        lazy: screen(
          async () => (await import('./pages/MessagesPage.tsx')).MessagesPage,
          ['messages', 'threads'],
        ),
      },
      {
        path: '/messages/new',
        lazy: screen(
          async () => (await import('./pages/NewMessagePage.tsx')).NewMessagePage,
          ['messages', 'threads'],
        ),
      },
      {
        path: '/messages/:threadId',
        lazy: screen(
          async () => (await import('./pages/ThreadPage.tsx')).ThreadPage,
          ['messages', 'threads', 'record'],
        ),
      },
    ],
  },
];

/** The places of a patient or caregiver beside Today, My plan and the check-in. */
export const patientRoutes: RouteObject[] = [...accountRoutes, ...messageRoutes];
