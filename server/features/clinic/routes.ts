import { getSignInPage, getWorkerHealth } from '#shared/clinic/contract.ts';
import { withTx } from '../../db/with-tx.ts';
import { route } from '../../http/route.ts';
import { countUnsent } from '../../notifications/deliveries.ts';
import { clinicOf, countUnevaluated, findOnlyClinicId } from './queries.ts';
import { workerHealth, workerLateAfterMs } from './worker-health.ts';

export const clinicRoutes = (lastBeat: () => Promise<Date | null>) => [
  route(getSignInPage, {
    access: { public: 'The emergency number stands on the sign-in page too.' },
    audit: { none: 'A name and telephone numbers of the clinic.' },
    handler: async ({ pools }) => {
      const clinicId = await withTx(pools.app, { kind: 'anonymous' }, findOnlyClinicId);
      if (!clinicId) return { clinic: null, demo: false };
      const clinic = await withTx(pools.app, { kind: 'system', clinicId }, (tx) => clinicOf(tx, clinicId));
      return { clinic, demo: clinic.isDemo };
    },
  }),
  route(getWorkerHealth, {
    access: { permission: 'worker:read' },
    audit: { none: 'Counts only.' },
    handler: async ({ tx, actor, now }) => ({
      ...workerHealth(await lastBeat(), now),
      unevaluated: await countUnevaluated(tx, actor.clinicId, new Date(now.getTime() - workerLateAfterMs)),
      unsent: await countUnsent(tx, actor.clinicId, now),
    }),
  }),
];
