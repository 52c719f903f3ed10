import {
  changeNotificationSettings,
  getNotificationSettings,
  listDeliveries,
  sendAgain,
  testChannel,
} from '#shared/notifications/contract.ts';
import { route } from '../http/route.ts';
import { testOwnChannel } from './channel-test.ts';
import { listOfDeliveries, sendOnceMore } from './deliveries.ts';
import { changeSettings, settingsOf } from './settings.ts';

export const notificationRoutes = [
  route(getNotificationSettings, {
    access: { permission: 'account:own' },
    audit: { none: 'One’s own choices.' },
    handler: ({ tx, actor }) => settingsOf(tx, actor),
  }),
  route(changeNotificationSettings, {
    access: { permission: 'account:own' },
    audit: 'notification-settings.changed',
    handler: ({ body, tx, actor, now }) => changeSettings(tx, actor, body, now),
  }),
  route(testChannel, {
    access: { permission: 'account:own' },
    audit: 'notification.tested',
    handler: ({ body, tx, actor, now }) => testOwnChannel(tx, actor, body.channel, now),
  }),
  route(listDeliveries, {
    access: { permission: 'delivery:manage' },
    audit: 'deliveries.listed',
    handler: ({ tx, actor, now }) => listOfDeliveries(tx, actor, now),
  }),
  route(sendAgain, {
    access: { permission: 'delivery:manage' },
    audit: 'delivery.sent-again',
    handler: ({ params, tx, actor, now }) => sendOnceMore(tx, actor, params.deliveryId, now),
  }),
];
