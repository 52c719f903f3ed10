import { randomUUID } from 'node:crypto';
import { and, asc, eq, sql } from 'drizzle-orm';
import { isStaff } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../db/actor.ts';
import { pushSubscriptions } from '../db/schema/notifications.ts';
import type { Tx } from '../db/with-tx.ts';
import { deviceName } from '../features/accounts/devices.ts';
import { writeAudit } from '../features/audit/service.ts';
import { liveSession } from '../http/sessions.ts';
import type { Site } from '../http/site.ts';
import { isPushEndpoint } from './push-endpoint.ts';
import { holdSubscriptions } from './push-subscriptions.ts';
import { notify } from './service.ts';

const cardColumns = {
  id: pushSubscriptions.id,
  sessionId: pushSubscriptions.sessionId,
  deviceName: pushSubscriptions.deviceName,
  createdAt: pushSubscriptions.createdAt,
  lastSentAt: pushSubscriptions.lastSentAt,
};

type CardRow = Pick<typeof pushSubscriptions.$inferSelect, keyof typeof cardColumns>;

const card = ({ sessionId, createdAt, lastSentAt, ...rest }: CardRow, current: string) => ({
  ...rest,
  createdAt: createdAt.toISOString(),
  lastSentAt: lastSentAt?.toISOString() ?? null,
  current: sessionId === current,
});

const ofActor = ({ clinicId, personId }: PersonActor) =>
  and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.personId, personId));

/** One's own devices that may be woken. */
export const ownPushDevices = async (tx: Tx, actor: PersonActor, sessionId: string) => {
  const rows = await tx
    .select(cardColumns)
    .from(pushSubscriptions)
    .where(ofActor(actor))
    .orderBy(asc(pushSubscriptions.createdAt), asc(pushSubscriptions.id));
  return { subscriptions: rows.map((row) => card(row, sessionId)) };
};

/**
 * Lets the browser of this session be woken. A browser has one endpoint, so the same one of anybody else in the
 * clinic is taken over, under a new id: what still waits for the other person finds no device.
 */
export const addPushDevice = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  {
    sessionId,
    userAgent,
    ...given
  }: { sessionId: string; userAgent: string | null; endpoint: string; p256dh: string; auth: string },
  now: Date,
) => {
  if (!isPushEndpoint(given.endpoint)) {
    const errors = [{ field: 'endpoint', message: 'That is no address of a push service.' }];
    throw new Problem('invalid-input', undefined, { errors });
  }
  const { clinicId, personId } = actor;
  await holdSubscriptions(tx, sessionId);
  await holdSubscriptions(tx, personId);
  // Whoever signed out while this was under way is not woken here any more.
  if (!(await liveSession(site.gate, sessionId, now))) throw new Problem('not-signed-in');
  const device = { ...given, deviceName: deviceName(userAgent) };
  const values = { clinicId, personId, sessionId, ...device, createdAt: now };
  const rows = await tx
    .insert(pushSubscriptions)
    .values(values)
    .onConflictDoUpdate({
      target: [pushSubscriptions.clinicId, pushSubscriptions.endpoint],
      set: {
        ...values,
        id: sql`case when ${pushSubscriptions.personId} = ${personId} then ${pushSubscriptions.id} else gen_random_uuid() end`,
        lastSentAt: sql`case when ${pushSubscriptions.personId} = ${personId} then ${pushSubscriptions.lastSentAt} end`,
      },
    })
    .returning(cardColumns);
  const added = rows[0];
  if (!added) throw new Error('The subscription was not written.');
  await writeAudit(tx, actor, { action: 'push.added', subjectId: added.id }, now);
  return card(added, sessionId);
};

/** Wakes that device of one's own no more. */
export const removePushDevice = async (tx: Tx, actor: PersonActor, id: string, now: Date): Promise<void> => {
  const removed = await tx
    .delete(pushSubscriptions)
    .where(and(ofActor(actor), eq(pushSubscriptions.id, id)))
    .returning({ id: pushSubscriptions.id });
  if (removed.length === 0) throw new Problem('not-found');
  await writeAudit(tx, actor, { action: 'push.removed', subjectId: id }, now);
};

/** Sends a test to one device of one's own. */
export const testPushDevice = async (tx: Tx, actor: PersonActor, id: string, now: Date): Promise<void> => {
  const { clinicId, personId } = actor;
  const found = await tx
    .select({ id: pushSubscriptions.id })
    .from(pushSubscriptions)
    .where(and(ofActor(actor), eq(pushSubscriptions.id, id)));
  if (found.length === 0) throw new Problem('not-found');
  const path = isStaff(actor.roles) ? '/clinic/account/notifications' : '/account/notifications';
  const occasion = { kind: 'test', occasion: `test:${randomUUID()}`, path } as const;
  await notify(tx, clinicId, [personId], occasion, now, { channels: ['push'], subscriptionId: id });
  await writeAudit(tx, actor, { action: 'push.tested', subjectId: id }, now);
};
