import { randomUUID } from 'node:crypto';
import { coversClinic, isClinician, type Role } from '#shared/access/permissions.ts';
import type { MorningRound } from '#shared/triage/contract.ts';
import type { ThreadSummary } from '#shared/threads/contract.ts';
import { testPassword, type TestPatient, type TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { alertBody, checkInBody } from '../check-ins/bodies.ts';
import { plantAlert, plantCheckIn, plantFlag, plantThread } from '../records.ts';
import type { Relation } from './scene.ts';

type Request = { id?: string; body?: unknown };

export type RouteFixture = {
  /** Makes a row of the owner and the request for it, anew for every call. `worker` is a clinician there. */
  request: (
    database: TestDatabase,
    cast: { actor: TestPerson; owner: TestPatient; worker: TestPerson },
  ) => Promise<Request>;
  /** The parameter that names the row; without one, the route is about no row but the asker's own. */
  param?: 'alertId' | 'flagId' | 'threadId';
  /** The door of the row: whether one who holds the permission sees it. */
  door?: (role: Role, relation: Relation) => boolean;
  /** Holders of the permission whom the use case refuses all the same. */
  refuses?: (role: Role) => boolean;
  /** The body's id is made by the client: an id that somebody else used already is nobody's business. */
  clientIds?: true;
  /** Whose rows a list shows, by the ids of their patients. */
  patientsIn?: (body: unknown) => string[];
  /** What a public route writes once it knows who it is, beside its declaration of none. */
  writes?: string;
  /** The session is over afterwards: sign in anew. */
  endsSession?: true;
};

const ownOnly = (_role: Role, relation: Relation) => relation === 'own';
const wholeClinic = (_role: Role, relation: Relation) => relation !== "other clinic's";
const threadDoor = (role: Role, relation: Relation) =>
  coversClinic([role]) ? wholeClinic(role, relation) : relation === 'own';

const nothing = async (): Promise<Request> => ({});

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
  async (database, { owner }) => {
    const { clientId } = await plantAlert(database, owner);
    return { id: clientId, body: body?.() };
  };

const patientsOf = (rows: { patient: { id: string } }[]) => rows.map(({ patient }) => patient.id);
const onFlags = { param: 'flagId', door: wholeClinic } as const;
const onThreads = { param: 'threadId', door: threadDoor } as const;
const onAlerts = { param: 'alertId', door: ownOnly } as const;
const text = () => ({ id: randomUUID(), text: 'Please ring us today.' });

/** Every route by method and path. A route that is missing here fails the matrix. */
export const routeFixtures: Record<string, RouteFixture> = {
  'get /api/session': { request: nothing },
  'post /api/session': {
    request: async (_database, { actor }) => ({ body: { email: actor.email, password: testPassword } }),
    writes: 'session.started',
    endsSession: true,
  },
  'delete /api/session': { request: nothing, endsSession: true },
  'post /api/session/activity': { request: nothing },
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
};
