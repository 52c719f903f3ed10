import { z } from 'zod';
import { phoneField, timeZoneField } from '../accounts/fields.ts';
import { contract } from '../http/contract.ts';
import { notificationChannels, notificationKinds, notificationStates } from './kinds.ts';

const clockTime = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Enter a time such as 21:00.');

const choice = z.object({
  kind: z.enum(notificationKinds),
  channel: z.enum(notificationChannels),
  enabled: z.boolean(),
});

export const notificationSettings = z.object({
  /** Every kind that this person's roles choose, on every channel it can go out on. */
  choices: z.array(
    choice.extend({
      /** It cannot be turned off: the last channel of a page that can wake somebody. */
      locked: z.boolean(),
    }),
  ),
  /** What a page needs in order to wake this person as chosen, and what is not there: a number, a device. */
  missing: z.array(z.enum(['phone', 'push'])),
  phone: z.string().nullable(),
  email: z.string(),
  emailBounced: z.boolean(),
  timeZone: z.string(),
  quietFrom: z.string().nullable(),
  quietUntil: z.string().nullable(),
  /** Patients: when to be reminded of the check-in. */
  remindAt: z.string().nullable(),
});
export type NotificationSettings = z.output<typeof notificationSettings>;

export const getNotificationSettings = contract({
  method: 'get',
  path: '/api/notification-settings',
  summary: 'One’s own choices by kind and channel, quiet hours, telephone number and time zone.',
  status: 200,
  output: notificationSettings,
});

export const changeNotificationSettingsBody = z
  .strictObject({
    choices: z.array(z.strictObject(choice.shape)).max(60),
    phone: phoneField.nullable(),
    timeZone: timeZoneField,
    quietFrom: clockTime.nullable(),
    quietUntil: clockTime.nullable(),
    remindAt: clockTime.nullable(),
  })
  .refine(({ quietFrom, quietUntil }) => (quietFrom === null) === (quietUntil === null), {
    path: ['quietUntil'],
    message: 'Give both times, or neither.',
  })
  .refine(({ quietFrom, quietUntil }) => quietFrom === null || quietFrom !== quietUntil, {
    path: ['quietUntil'],
    message: 'Give two different times, or neither.',
  });

export const changeNotificationSettings = contract({
  method: 'put',
  path: '/api/notification-settings',
  summary: 'Change them. What must reach somebody keeps one channel that can wake them.',
  status: 200,
  body: changeNotificationSettingsBody,
  output: notificationSettings,
});

export const pushSubscription = z.object({
  id: z.uuid(),
  deviceName: z.string(),
  createdAt: z.iso.datetime(),
  lastSentAt: z.iso.datetime().nullable(),
  /** It belongs to the browser that asks. */
  current: z.boolean(),
});

export const getPushKey = contract({
  method: 'get',
  path: '/api/push-key',
  summary: 'The public key by which browsers know this server (VAPID, RFC 8292), base64url.',
  status: 200,
  output: z.object({ publicKey: z.string() }),
});

export const listPushSubscriptions = contract({
  method: 'get',
  path: '/api/push-subscriptions',
  summary: 'One’s own devices that may be woken.',
  status: 200,
  output: z.object({ subscriptions: z.array(pushSubscription) }),
});

export const addPushSubscription = contract({
  method: 'post',
  path: '/api/push-subscriptions',
  summary: 'Let this browser be woken. The same endpoint of anybody else in the clinic is replaced.',
  status: 201,
  body: z.strictObject({
    endpoint: z.url('That is no push address.').max(1000),
    /** RFC 8291: 65 bytes and 16 bytes, base64url. */
    p256dh: z.string().regex(/^[A-Za-z0-9_-]{87}=?$/, 'That is no key.'),
    auth: z.string().regex(/^[A-Za-z0-9_-]{22}(==)?$/, 'That is no key.'),
  }),
  output: pushSubscription,
});

const subscriptionParams = z.object({ subscriptionId: z.uuid() });

export const removePushSubscription = contract({
  method: 'delete',
  path: '/api/push-subscriptions/:subscriptionId',
  summary: 'Wake this device no more.',
  status: 204,
  params: subscriptionParams,
});

export const testPushSubscription = contract({
  method: 'post',
  path: '/api/push-subscriptions/:subscriptionId/test',
  summary: 'Send a test to one device.',
  status: 204,
  params: subscriptionParams,
});

export const testChannel = contract({
  method: 'post',
  path: '/api/notification-tests',
  summary: 'Send a test by e-mail, SMS or telephone call to oneself.',
  status: 204,
  body: z.strictObject({ channel: z.enum(['email', 'sms', 'phone']) }),
});

export const delivery = z.object({
  id: z.uuid(),
  person: z.object({ id: z.uuid(), name: z.string() }),
  channel: z.enum(notificationChannels),
  kind: z.enum(notificationKinds),
  state: z.enum(notificationStates),
  attempts: z.number().int(),
  /** The kind of failure, never the words of a foreign server. */
  lastError: z.string().nullable(),
  createdAt: z.iso.datetime(),
  dueAt: z.iso.datetime(),
  sentAt: z.iso.datetime().nullable(),
  outcome: z.string().nullable(),
  acknowledgedAt: z.iso.datetime().nullable(),
});
export type Delivery = z.output<typeof delivery>;

export const listDeliveries = contract({
  method: 'get',
  path: '/api/deliveries',
  summary:
    'What failed for good or came back, what waits for over ten minutes, and the newest hundred besides.',
  status: 200,
  output: z.object({
    failed: z.array(delivery),
    late: z.array(delivery),
    recent: z.array(delivery),
  }),
});

export const sendAgain = contract({
  method: 'post',
  path: '/api/deliveries/:deliveryId/again',
  summary: 'Send what failed or came back once more.',
  status: 200,
  params: z.object({ deliveryId: z.uuid() }),
  output: delivery,
});
