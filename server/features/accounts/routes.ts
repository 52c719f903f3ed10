import { sessionRoutes } from './session-routes.ts';
import { wayInRoutes } from './way-in-routes.ts';

export const accountRoutes = [...sessionRoutes, ...wayInRoutes];
