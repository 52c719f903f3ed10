import { listActivity } from '#shared/caregivers/contract.ts';
import { route } from '../../http/route.ts';
import { activityFor } from './service.ts';

export const activityRoutes = [
  route(listActivity, {
    access: { permission: 'activity:read' },
    audit: 'activity.listed',
    handler: ({ query, tx, actor, now }) => activityFor(tx, actor, query, now),
  }),
];
