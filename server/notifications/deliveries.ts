import { and, desc, eq, gt, inArray, lt, or, type SQL } from 'drizzle-orm';
import { kindRules, notificationKinds } from '#shared/notifications/kinds.ts';
import type { Delivery } from '#shared/notifications/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../db/actor.ts';
import { notifications } from '../db/schema/notifications.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import { auditOpening, writeAudit } from '../features/audit/service.ts';
import { enqueue } from '../jobs/enqueue.ts';
import { isNotification } from './claiming.ts';

/** What waits for longer than this is late. */
const lateAfterMs = 10 * 60_000;
/** A page that reached nobody is told on every clinic screen for so long; the administrator's list keeps it. */
const toldForMs = 7 * 24 * 60 * 60_000;
const atMost = 100;

const pages = notificationKinds.filter((kind) => kindRules[kind].mustReach);

/** Ended without having reached anybody; what was dropped had nobody left to reach. */
const hasFailed = inArray(notifications.state, ['failed', 'bounced']);

/** Overdue, or tried in vain for a while. What waits for the end of quiet hours is neither. */
const isLate = (now: Date): SQL | undefined => {
  const before = new Date(now.getTime() - lateAfterMs);
  return and(
    eq(notifications.state, 'pending'),
    or(
      lt(notifications.dueAt, before),
      and(gt(notifications.attempts, 0), lt(notifications.createdAt, before)),
    ),
  );
};

/** What a clinic's screens warn of: pages that reached nobody in the last days, and whatever is late. */
export const countUnsent = (tx: Tx, clinicId: string, now: Date): Promise<number> =>
  tx.$count(
    notifications,
    and(
      eq(notifications.clinicId, clinicId),
      or(
        isLate(now),
        and(
          hasFailed,
          inArray(notifications.kind, pages),
          gt(notifications.createdAt, new Date(now.getTime() - toldForMs)),
        ),
      ),
    ),
  );

const deliveriesWhere = async (tx: Tx, clinicId: string, which: SQL | undefined): Promise<Delivery[]> => {
  const rows = await tx
    .select({ row: notifications, name: people.name })
    .from(notifications)
    .innerJoin(
      people,
      and(eq(people.clinicId, notifications.clinicId), eq(people.id, notifications.personId)),
    )
    .where(and(eq(notifications.clinicId, clinicId), which))
    .orderBy(desc(notifications.createdAt), desc(notifications.id))
    .limit(atMost);
  return rows.map(({ row, name }) => ({
    id: row.id,
    person: { id: row.personId, name },
    channel: row.channel,
    kind: row.kind,
    state: row.state,
    attempts: row.attempts,
    lastError: row.lastError,
    createdAt: row.createdAt.toISOString(),
    dueAt: row.dueAt.toISOString(),
    sentAt: row.sentAt?.toISOString() ?? null,
    outcome: row.outcome,
    acknowledgedAt: row.acknowledgedAt?.toISOString() ?? null,
  }));
};

export const listOfDeliveries = async (tx: Tx, actor: PersonActor, now: Date) => {
  const { clinicId } = actor;
  const [failed, late, recent] = [
    await deliveriesWhere(tx, clinicId, hasFailed),
    await deliveriesWhere(tx, clinicId, isLate(now)),
    await deliveriesWhere(tx, clinicId, undefined),
  ];
  await auditOpening(tx, actor, { action: 'deliveries.listed', subjectId: clinicId }, now);
  return { failed, late, recent };
};

/** Begins anew with what failed or came back; two administrators at once begin it once. */
export const sendOnceMore = async (
  tx: Tx,
  actor: PersonActor,
  deliveryId: string,
  now: Date,
): Promise<Delivery> => {
  const { clinicId } = actor;
  const changed = await tx
    .update(notifications)
    .set({ state: 'pending', attempts: 0, dueAt: now, leasedUntil: null, lastError: null, outcome: null })
    .where(and(isNotification(clinicId, deliveryId), hasFailed))
    .returning({ kind: notifications.kind });
  const [delivery] = await deliveriesWhere(tx, clinicId, eq(notifications.id, deliveryId));
  if (!delivery) throw new Problem('not-found');
  const [row] = changed;
  if (!row) throw new Problem('state-conflict', 'Only what failed or came back can be sent again.');
  const job = { clinicId, notificationId: deliveryId };
  await enqueue(tx, 'send-notification', job, { key: deliveryId, priority: 10 - kindRules[row.kind].rank });
  await writeAudit(tx, actor, { action: 'delivery.sent-again', subjectId: deliveryId }, now);
  return delivery;
};
