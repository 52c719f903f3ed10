import { createBrowserRouter } from 'react-router-dom';
import type { PatchRoutesOnNavigationFunction } from 'react-router-dom';
import { ErrorPage } from './app/ErrorPage.tsx';
import { HomePage } from './app/HomePage.tsx';
import { RequireRecord } from './app/RequireRecord.tsx';
import { RequireRole } from './app/RequireRole.tsx';
import { RootLayout } from './app/RootLayout.tsx';
import { screen } from './app/screen.ts';
import { Splash } from './app/Splash.tsx';
import { checkInWords } from './features/check-ins/word-files.ts';

const clinicAddress = /^\/(round|caseload|clinic|letters)(\/|$)/;
const accessAddress = /^\/(invitation|start|forgot-password|reset-password|confirm-email|second-factor)$/;
const patientAddress = /^\/(account|caring|messages)(\/|$)/;

/** These addresses are fetched by whoever goes to one: the first load of Today has no room for them. */
const addRoutes: PatchRoutesOnNavigationFunction = async ({ path, patch }) => {
  if (clinicAddress.test(path)) patch('root', (await import('./clinic-routes.tsx')).clinicRoutes);
  if (accessAddress.test(path)) patch('root', (await import('./access-routes.tsx')).accessRoutes);
  if (patientAddress.test(path)) {
    const { caringRoutes, patientRoutes } = await import('./patient-routes.tsx');
    patch('patient-side', caringRoutes);
    patch('patient-shell', patientRoutes);
  }
};

/** The addresses of the application. Each screen is a chunk of its own. */
export const createRouter = () =>
  createBrowserRouter(
    [
      {
        id: 'root',
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
            id: 'patient-side',
            element: <RequireRole anyOf={['patient', 'caregiver']} />,
            children: [
              {
                element: <RequireRecord />,
                children: [
                  {
                    id: 'patient-shell',
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
                          ['my-plan', 'plan', 'plan-details'],
                        ),
                      },
                    ],
                  },
                  {
                    path: '/check-in',
                    lazy: screen(
                      async () => (await import('./pages/CheckInPage.tsx')).CheckInPage,
                      checkInWords,
                    ),
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
            ],
          },
          {
            path: '/no-screens',
            lazy: screen(
              async () => (await import('./pages/NoScreensPage.tsx')).NoScreensPage,
              ['nowhere', 'leaving'],
            ),
          },
          {
            path: '*',
            lazy: screen(async () => (await import('./pages/NotFoundPage.tsx')).NotFoundPage, ['nowhere']),
          },
        ],
      },
    ],
    { patchRoutesOnNavigation: addRoutes },
  );
