import { beforeEach, expect, it, vi } from 'vitest';
import { accessRoutes } from '#src/access-routes.tsx';
import { caringRoutes, patientRoutes } from '#src/patient-routes.tsx';
import { clinicRoutes } from '#src/clinic-routes.tsx';
import { createRouter } from '#src/router.tsx';
import { startI18n } from '#src/lib/i18n.ts';
import type { RouteObject } from 'react-router-dom';

const addressesIn = (routes: readonly RouteObject[]): string[] =>
  routes.flatMap(({ path, children }) => [...(path ? [path] : []), ...addressesIn(children ?? [])]);

const later = addressesIn([...accessRoutes, ...caringRoutes, ...patientRoutes, ...clinicRoutes]);

beforeEach(startI18n);

it.each(later)('%s is found, though its route is fetched only when somebody goes there', async (address) => {
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  window.history.replaceState(null, '', '/no-screens');
  const router = createRouter();
  await router.navigate(address.replaceAll(/\/:\w+\?/g, '').replaceAll(/:\w+/g, '42'));
  expect(router.state.matches.at(-1)?.route.path).toBe(address);
  router.dispose();
});
