import { Router } from 'express';
import { workerHealth } from '../features/clinic/worker-health.ts';

/**
 * `/healthz`: this process answers. `/readyz`: it can also reach its database; a late worker is told there
 * but does not make a web unready, since webs evaluate what a worker leaves.
 */
export const healthRouter = (
  reachDatabase: () => Promise<void>,
  lastBeat: () => Promise<Date | null>,
  clock: () => Date,
): Router => {
  const router = Router();
  router.get('/healthz', (_req, res) => {
    res.json({ status: 'ok' });
  });
  router.get('/readyz', (_req, res) => {
    reachDatabase()
      .then(lastBeat)
      .then(
        (last) => res.json({ status: 'ready', worker: workerHealth(last, clock()) }),
        () => res.status(503).json({ status: 'not ready', reason: 'The database is not reachable.' }),
      );
  });
  return router;
};
