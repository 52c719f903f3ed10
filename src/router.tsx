import type { ComponentType } from 'react';
import { createBrowserRouter } from 'react-router-dom';
import { clinicianRoles } from '#shared/access/permissions.ts';
import { ErrorPage } from './app/ErrorPage.tsx';
import { HomePage } from './app/HomePage.tsx';
import { RequireRole } from './app/RequireRole.tsx';
import { RootLayout } from './app/RootLayout.tsx';
import { Splash } from './app/Splash.tsx';
import { checkInWords } from './features/check-ins/word-files.ts';
import { loadWords } from './lib/i18n.ts';

/** A screen whose code and files of words are fetched together, when it is gone to. */
const screen =
  (load: () => Promise<ComponentType>, words: readonly string[] = []) =>
  async () => {
    const [Component] = await Promise.all([load(), loadWords(words)]);
    return { Component };
  };

/** The addresses of the application. Each screen is a chunk of its own. */
export const createRouter = () =>
  createBrowserRouter([
    {
      element: <RootLayout />,
      errorElement: <ErrorPage />,
      hydrateFallbackElement: <Splash />,
      children: [
        { path: '/', element: <HomePage /> },
        {
          path: '/sign-in',
          lazy: screen(async () => (await import('./pages/SignInPage.tsx')).SignInPage, ['accounts']),
        },
        {
          element: <RequireRole anyOf={['patient']} />,
          children: [
            {
              lazy: screen(async () => (await import('./app/shells/PatientShell.tsx')).PatientShell),
              children: [
                {
                  path: '/today',
                  lazy: screen(
                    async () => (await import('./pages/TodayPage.tsx')).TodayPage,
                    ['today', 'plan'],
                  ),
                },
                {
                  path: '/plan',
                  lazy: screen(
                    async () => (await import('./pages/MyPlanPage.tsx')).MyPlanPage,
                    ['my-plan', 'plan'],
                  ),
                },
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
                    ['messages', 'threads'],
                  ),
                },
              ],
            },
            {
              path: '/check-in',
              lazy: screen(async () => (await import('./pages/CheckInPage.tsx')).CheckInPage, checkInWords),
            },
            {
              path: '/something-new',
              lazy: screen(
                async () => (await import('./pages/CheckInPage.tsx')).SomethingNewPage,
                checkInWords,
              ),
            },
          ],
        },
        {
          element: <RequireRole anyOf={clinicianRoles} />,
          children: [
            {
              lazy: screen(async () => (await import('./app/shells/ClinicShell.tsx')).ClinicShell),
              children: [
                {
                  path: '/round/:flagId?',
                  lazy: screen(async () => (await import('./pages/MorningRoundPage.tsx')).MorningRoundPage),
                },
                {
                  path: '/clinic/messages/:threadId?',
                  lazy: screen(
                    async () => (await import('./pages/ClinicMessagesPage.tsx')).ClinicMessagesPage,
                    ['threads'],
                  ),
                },
              ],
            },
          ],
        },
        {
          path: '/no-screens',
          lazy: screen(async () => (await import('./pages/NoScreensPage.tsx')).NoScreensPage),
        },
        { path: '*', lazy: screen(async () => (await import('./pages/NotFoundPage.tsx')).NotFoundPage) },
      ],
    },
  ]);
