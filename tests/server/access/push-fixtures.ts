import { createECDH, randomBytes, randomUUID } from 'node:crypto';
import type { TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { nothing, type RouteFixture } from './fixture.ts';

const subscription = () => {
  const pair = createECDH('prime256v1');
  pair.generateKeys();
  return {
    endpoint: `https://push.example/push/${randomUUID()}`,
    p256dh: pair.getPublicKey('base64url'),
    auth: randomBytes(16).toString('base64url'),
  };
};

const plantDevice = async (
  { asSuperuser }: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const { endpoint, p256dh, auth } = subscription();
  const { rows } = await asSuperuser.query<{ id: string }>(
    `insert into push_subscriptions
       (clinic_id, person_id, session_id, endpoint, p256dh, auth, device_name, created_at)
     values ($1, $2, $3, $4, $5, $6, 'Chrome on Android', now()) returning id`,
    [clinicId, personId, randomUUID(), endpoint, p256dh, auth],
  );
  return rows[0]!.id;
};

/** A device of the patient whose rows are asked for: a role that looks after them does not come near it. */
const onDevices = {
  param: 'subscriptionId',
  door: (role, relation) => role === 'patient' && relation === 'own',
  request: async (database, { owner }) => ({ id: await plantDevice(database, owner) }),
} satisfies RouteFixture;

/** The browsers that somebody lets be woken. */
export const pushFixtures: Record<string, RouteFixture> = {
  'get /api/push-key': { request: nothing },
  'get /api/push-subscriptions': { request: nothing },
  'post /api/push-subscriptions': { request: async () => ({ body: subscription() }) },
  'delete /api/push-subscriptions/:subscriptionId': onDevices,
  'post /api/push-subscriptions/:subscriptionId/test': onDevices,
};
