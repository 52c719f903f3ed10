import {
  addPushSubscription,
  getPushKey,
  listPushSubscriptions,
  removePushSubscription,
  testPushSubscription,
} from '#shared/notifications/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { Browser } from '../http/browser.ts';
import { route } from '../http/route.ts';
import { addPushDevice, ownPushDevices, removePushDevice, testPushDevice } from './push-devices.ts';

const sessionOf = ({ signedIn }: Browser): string => {
  if (!signedIn) throw new Problem('not-signed-in');
  return signedIn.sessionId;
};

export const pushRoutes = [
  route(getPushKey, {
    access: { permission: 'account:own' },
    audit: { none: 'The key is public.' },
    handler: ({ site }) => Promise.resolve({ publicKey: site.vapidPublicKey }),
  }),
  route(listPushSubscriptions, {
    access: { permission: 'account:own' },
    audit: { none: 'One’s own devices.' },
    handler: ({ tx, actor, browser }) => ownPushDevices(tx, actor, sessionOf(browser)),
  }),
  route(addPushSubscription, {
    access: { permission: 'account:own' },
    audit: 'push.added',
    handler: ({ tx, site, actor, browser, body, now }) =>
      addPushDevice(
        tx,
        site,
        actor,
        { sessionId: sessionOf(browser), userAgent: browser.userAgent, ...body },
        now,
      ),
  }),
  route(removePushSubscription, {
    access: { permission: 'account:own' },
    audit: 'push.removed',
    handler: ({ tx, actor, params, now }) => removePushDevice(tx, actor, params.subscriptionId, now),
  }),
  route(testPushSubscription, {
    access: { permission: 'account:own' },
    audit: 'push.tested',
    handler: ({ tx, actor, params, now }) => testPushDevice(tx, actor, params.subscriptionId, now),
  }),
];
