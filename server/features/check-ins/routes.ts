import {
  getAlert,
  getCheckInContext,
  postAlert,
  postCheckIn,
  postMistake,
} from '#shared/check-ins/contract.ts';
import { route } from '../../http/route.ts';
import { contextFor } from './context.ts';
import { readAlert, submitAlert, submitCheckIn, submitMistake } from './service.ts';

export const checkInRoutes = [
  route(getCheckInContext, {
    access: { permission: 'check-in:write' },
    audit: 'check-in.context-read',
    handler: ({ tx, actor, now }) => contextFor(tx, actor, now),
  }),
  route(postCheckIn, {
    access: { permission: 'check-in:write' },
    audit: 'check-in.sent',
    handler: ({ body, tx, actor, now }) => submitCheckIn(tx, actor, body, now),
  }),
  route(postAlert, {
    access: { permission: 'check-in:write' },
    audit: 'alert.sent',
    handler: ({ body, tx, actor, now }) => submitAlert(tx, actor, body, now),
  }),
  route(getAlert, {
    access: { permission: 'check-in:write' },
    audit: { none: 'A patient asks what became of their own alert, every few seconds.' },
    handler: ({ params, tx, actor }) => readAlert(tx, actor, params.alertId),
  }),
  route(postMistake, {
    access: { permission: 'check-in:write' },
    audit: 'alert.called-a-mistake',
    handler: ({ params, body, tx, actor, now }) => submitMistake(tx, actor, { ...params, ...body }, now),
  }),
];
