import type { RouteObject } from 'react-router-dom';
import { roles } from '#shared/access/permissions.ts';
import { RequireRole } from './app/RequireRole.tsx';
import { screen } from './app/screen.ts';

/** The addresses by which somebody gets in for the first time, or again. Each screen is a chunk of its own. */
export const accessRoutes: RouteObject[] = [
  {
    path: '/invitation',
    lazy: screen(async () => (await import('./pages/InvitationPage.tsx')).InvitationPage, ['accounts']),
  },
  {
    path: '/start',
    lazy: screen(async () => (await import('./pages/StartPage.tsx')).StartPage, ['accounts']),
  },
  {
    path: '/forgot-password',
    lazy: screen(
      async () => (await import('./pages/ForgotPasswordPage.tsx')).ForgotPasswordPage,
      ['accounts'],
    ),
  },
  {
    path: '/reset-password',
    lazy: screen(async () => (await import('./pages/ResetPasswordPage.tsx')).ResetPasswordPage, ['accounts']),
  },
  {
    path: '/confirm-email',
    lazy: screen(async () => (await import('./pages/ConfirmEmailPage.tsx')).ConfirmEmailPage, ['accounts']),
  },
  {
    element: <RequireRole anyOf={roles} />,
    children: [
      {
        path: '/second-factor',
        lazy: screen(
          async () => (await import('./pages/SecondFactorSetupPage.tsx')).SecondFactorSetupPage,
          ['accounts', 'leaving'],
        ),
      },
    ],
  },
];
