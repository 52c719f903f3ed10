import { randomUUID } from 'node:crypto';
import { nothing, wholeClinic, type RouteFixture } from './fixture.ts';

/** One's own settings, and what was sent to whom in the clinic. */
export const notificationFixtures: Record<string, RouteFixture> = {
  'get /api/notification-settings': { request: nothing },
  'put /api/notification-settings': {
    request: async () => ({
      body: {
        choices: [],
        phone: null,
        timeZone: 'America/New_York',
        quietFrom: '21:00',
        quietUntil: '07:00',
        remindAt: null,
      },
    }),
  },
  'post /api/notification-tests': { request: async () => ({ body: { channel: 'email' } }) },
  'get /api/deliveries': { request: nothing },
  'post /api/deliveries/:deliveryId/again': {
    param: 'deliveryId',
    door: wholeClinic,
    request: async (database, { owner }) => {
      const { rows } = await database.asSuperuser.query<{ id: string }>(
        `insert into notifications (clinic_id, person_id, channel, kind, occasion, path, state, created_at)
         values ($1, $2, 'email', 'new-message', $3, '/messages', 'failed', now()) returning id`,
        [owner.clinicId, owner.personId, `message:${randomUUID()}`],
      );
      return { id: rows[0]!.id };
    },
  },
};
