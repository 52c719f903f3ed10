import { randomUUID } from 'node:crypto';
import type { Role } from '#shared/access/permissions.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { makePerson, testPassword } from '#tests/support/clinic.ts';
import { invite, inviteBody, linkOf, plantNewcomer } from '../people/scene.ts';
import { nothing, wholeClinic, type RouteFixture } from './fixture.ts';

const reason = 'The list was wrong.';

/** Somebody who works at the clinic of the row that is asked for, and has not come yet. */
const staff =
  (
    made: { body?: () => unknown; also?: Record<string, string>; roles?: Role[] } = {},
    first?: (database: TestDatabase, personId: string) => Promise<unknown>,
  ): RouteFixture['request'] =>
  async (database, { worker }) => {
    const { personId } = await plantNewcomer(database, worker, made.roles ?? ['therapist', 'billing']);
    await first?.(database, personId);
    return { id: personId, body: made.body?.(), ...(made.also ? { also: made.also } : {}) };
  };

const onPeople = { param: 'personId', door: wholeClinic } as const;

const actOf: RouteFixture['request'] = async (database, { worker }) => {
  const { clinicId } = worker;
  const asker = await makePerson(database, clinicId, ['administrator']);
  const subject = await makePerson(database, clinicId, ['therapist']);
  const id = randomUUID();
  await database.asSuperuser.query(
    `insert into two_person_acts (clinic_id, id, kind, person_id, role, reason, state, requested_by, requested_at)
     values ($1, $2, 'grant-role', $3, 'administrator', $4, 'waiting', $5, now())`,
    [clinicId, id, subject.personId, reason, asker.personId],
  );
  return { id, body: { decision: 'refuse' } };
};

/** The open invitation of whoever asks, who has no way in for the moment. */
const ownInvitation =
  (way?: object): RouteFixture['request'] =>
  async (database, { actor }) => {
    // Asked by eight from one address at one instant: not what waits for tries are about.
    await database.asSuperuser.query('delete from sign_in_attempts');
    if (way)
      await database.asSuperuser.query('delete from credentials where person_id = $1', [actor.personId]);
    const card = await invite(database, actor, actor);
    return { body: { invitation: linkOf(card.id), ...(way ? { way } : {}) } };
  };

export const peopleFixtures: Record<string, RouteFixture> = {
  'get /api/people': { request: nothing },
  'post /api/people': { request: async () => ({ body: inviteBody() }) },
  'put /api/people/:personId': {
    ...onPeople,
    request: staff({ body: () => ({ name: 'Ilse Brandt', credential: null, phone: null, timeZone: null }) }),
  },
  'post /api/people/:personId/invitations': {
    ...onPeople,
    request: staff({ body: () => ({ byEmail: false }) }),
  },
  'post /api/people/:personId/deactivation': { ...onPeople, request: staff({ body: () => ({ reason }) }) },
  'post /api/people/:personId/reactivation': {
    ...onPeople,
    request: staff({ body: () => ({ reason }) }, (database, personId) =>
      database.asSuperuser.query('update people set active = false where id = $1', [personId]),
    ),
  },
  'post /api/people/:personId/roles': {
    ...onPeople,
    request: staff({ body: () => ({ role: 'on-call-clinician', reason }) }),
  },
  'delete /api/people/:personId/roles/:role': {
    ...onPeople,
    request: staff({ also: { role: 'billing' } }),
  },
  'post /api/people/:personId/second-factor-removal': {
    ...onPeople,
    request: staff({ body: () => ({ reason }) }),
  },
  'get /api/two-person-acts': { request: nothing },
  'post /api/two-person-acts/:actId/decision': { param: 'actId', door: wholeClinic, request: actOf },
  'get /api/invitations/:invitationId/letter': {
    param: 'invitationId',
    door: wholeClinic,
    request: async (database, { owner, worker }) => ({ id: (await invite(database, worker, owner)).id }),
  },

  'post /api/invitations/look': { request: ownInvitation() },
  'post /api/invitations/passkey-question': { request: ownInvitation() },
  'post /api/invitations/accept': {
    request: ownInvitation({ kind: 'password', password: testPassword }),
    writes: ['invitation.accepted', 'session.started'],
    endsSession: true,
  },
  'post /api/invitations/ask-again': { request: ownInvitation() },
};
