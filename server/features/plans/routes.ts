import { getMyPlan, getToday } from '#shared/plans/contract.ts';
import { route } from '../../http/route.ts';
import { myPlanFor, todayFor } from './service.ts';

export const planRoutes = [
  route(getToday, {
    access: { permission: 'today:read' },
    audit: 'today.read',
    handler: ({ tx, actor, now }) => todayFor(tx, actor, now),
  }),
  route(getMyPlan, {
    access: { permission: 'today:read' },
    audit: 'plan.read',
    handler: ({ tx, actor, now }) => myPlanFor(tx, actor, now),
  }),
];
