import { randomUUID } from 'node:crypto';
import { coversClinic, isClinician, type Role } from '#shared/access/permissions.ts';
import type { MorningRound } from '#shared/triage/contract.ts';
import type { ThreadSummary } from '#shared/threads/contract.ts';
import { alertBody, checkInBody } from '../check-ins/bodies.ts';
import { plantAlert, plantCheckIn, plantFlag, plantThread } from '../records.ts';
import { accountFixtures } from './account-fixtures.ts';
import { nothing, ownOnly, wholeClinic, type RouteFixture } from './fixture.ts';
import { notificationFixtures } from './notification-fixtures.ts';
import { patientFixtures } from './patient-fixtures.ts';
import { peopleFixtures } from './people-fixtures.ts';
import { pushFixtures } from './push-fixtures.ts';
import type { Relation } from './scene.ts';

const threadDoor = (role: Role, relation: Relation) =>
  coversClinic([role]) ? wholeClinic(role, relation) : relation === 'own';

const flag =
  (body?: () => unknown, claimed = false): RouteFixture['request'] =>
  async (database, { owner, worker }) => {
    const { flagId } = await plantFlag(database, owner, claimed ? { claimedBy: worker } : {});
    return { id: flagId, body: body?.() };
  };

const thread =
  (body?: () => unknown): RouteFixture['request'] =>
  async (database, { owner }) => {
    const { threadId } = await plantThread(database, owner);
    return { id: threadId, body: body?.() };
  };

const alert =
  (body?: () => unknown): RouteFixture['request'] =>
  async (database, { owner, author }) => {
    const { clientId } = await plantAlert(database, { ...owner, personId: author.personId });
    return { id: clientId, body: body?.() };
  };

const patientsOf = (rows: { patient: { id: string } }[]) => rows.map(({ patient }) => patient.id);
const onFlags = { param: 'flagId', door: wholeClinic } as const;
const onThreads = { param: 'threadId', door: threadDoor } as const;
const onAlerts = { param: 'alertId', door: ownOnly } as const;
const text = () => ({ id: randomUUID(), text: 'Please ring us today.' });

/** Every route by method and path. A route that is missing here fails the matrix. */
export const routeFixtures: Record<string, RouteFixture> = {
  ...accountFixtures,

  'get /api/sign-in-page': { request: nothing },
  'get /api/worker': { request: nothing },
  'get /api/today': { request: nothing },
  'get /api/my-plan': { request: nothing },

  'get /api/check-in-context': { request: nothing },
  'post /api/check-ins': {
    clientIds: true,
    request: async (database, { actor, owner }) => {
      const body = checkInBody();
      if (owner.personId !== actor.personId) await plantCheckIn(database, owner, { clientId: body.id });
      return { body };
    },
  },
  'post /api/alerts': {
    clientIds: true,
    request: async (database, { actor, owner }) => {
      const body = alertBody();
      if (owner.personId !== actor.personId)
        await plantAlert(database, owner, { clientId: body.id, checkInClientId: body.checkInId });
      return { body };
    },
  },
  'get /api/alerts/:alertId': { ...onAlerts, request: alert() },
  'post /api/alerts/:alertId/mistakes': {
    ...onAlerts,
    request: alert(() => ({ id: randomUUID(), answeredAt: new Date().toISOString() })),
  },

  'get /api/flags': {
    request: nothing,
    patientsIn: (body) => patientsOf((body as MorningRound).flags),
  },
  'get /api/flags/:flagId': { ...onFlags, request: flag() },
  'post /api/flags/:flagId/seen': { ...onFlags, request: flag() },
  'post /api/flags/:flagId/claim': { ...onFlags, request: flag() },
  'post /api/flags/:flagId/release': { ...onFlags, request: flag(undefined, true) },
  'post /api/flags/:flagId/close': {
    ...onFlags,
    request: flag(() => ({ outcome: 'advised-by-phone', worthRaising: 'yes' })),
  },
  'post /api/flags/:flagId/replies': { ...onFlags, request: flag(text) },

  'get /api/threads': {
    request: nothing,
    patientsIn: (body) => patientsOf((body as { threads: ThreadSummary[] }).threads),
  },
  'post /api/threads': {
    clientIds: true,
    refuses: (role) => isClinician([role]),
    request: async (database, { actor, owner }) => {
      const id = randomUUID();
      if (owner.personId !== actor.personId) await plantThread(database, owner, { clientId: id });
      return { body: { id, subject: 'Washing', message: text() } };
    },
  },
  'get /api/threads/:threadId': { ...onThreads, request: thread() },
  'get /api/threads/:threadId/messages': { ...onThreads, request: thread() },
  'post /api/threads/:threadId/messages': { ...onThreads, request: thread(text) },
  'post /api/threads/:threadId/seen': { ...onThreads, request: thread(() => ({ sequence: 1 })) },
  'post /api/threads/:threadId/close': { ...onThreads, request: thread() },

  ...notificationFixtures,
  ...patientFixtures,
  ...peopleFixtures,
  ...pushFixtures,
};
