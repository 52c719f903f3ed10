import { and, eq, sql } from 'drizzle-orm';
import type { SystemActor } from '../db/actor.ts';
import { notifications } from '../db/schema/notifications.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import { enqueue } from '../jobs/enqueue.ts';
import type { NotificationKind } from './wording.ts';

/** An emergency's mail goes before whatever else waits. */
const emergencyPriority = 10;

export type Occasion = {
  kind: NotificationKind;
  /** Ids and numbers only; the same occasion notifies a person once, however often it is reported. */
  occasion: string;
  /** Where the link leads, below the public address. */
  path: string;
};

/** Writes a pending row and its job for each person, in the transaction of what they are told about. */
export const notify = async (
  tx: Tx,
  clinicId: string,
  personIds: readonly string[],
  { kind, occasion, path }: Occasion,
  now: Date,
): Promise<void> => {
  if (personIds.length === 0) return;
  const written = await tx
    .insert(notifications)
    .values(
      [...new Set(personIds)].map((personId) => ({
        clinicId,
        personId,
        channel: 'email' as const,
        kind,
        occasion,
        path,
        createdAt: now,
      })),
    )
    .onConflictDoNothing()
    .returning({ id: notifications.id });
  const priority = kind === 'new-emergency' ? emergencyPriority : 0;
  for (const { id } of written) {
    await enqueue(tx, 'send-notification', { clinicId, notificationId: id }, { key: id, priority });
  }
};

/** What is to be sent and to whom; null when it was sent already or its person has left. */
export const pendingNotification = async (tx: Tx, actor: SystemActor, notificationId: string) => {
  const rows = await tx
    .select({
      id: notifications.id,
      kind: notifications.kind,
      path: notifications.path,
      email: people.email,
    })
    .from(notifications)
    .innerJoin(
      people,
      and(
        eq(people.clinicId, notifications.clinicId),
        eq(people.id, notifications.personId),
        eq(people.active, true),
      ),
    )
    .where(
      and(
        eq(notifications.clinicId, actor.clinicId),
        eq(notifications.id, notificationId),
        eq(notifications.state, 'pending'),
      ),
    );
  return rows[0] ?? null;
};

export const markSent = async (
  tx: Tx,
  actor: SystemActor,
  notificationId: string,
  now: Date,
): Promise<void> => {
  await tx
    .update(notifications)
    .set({ state: 'sent', sentAt: now, attempts: sql`${notifications.attempts} + 1`, lastError: null })
    .where(
      and(
        eq(notifications.clinicId, actor.clinicId),
        eq(notifications.id, notificationId),
        eq(notifications.state, 'pending'),
      ),
    );
};

/** Keeps why a try failed; after the last one the row stays as failed, for a person to see. */
export const markTryFailed = async (
  tx: Tx,
  actor: SystemActor,
  notificationId: string,
  { error, isLast }: { error: string; isLast: boolean },
): Promise<void> => {
  await tx
    .update(notifications)
    .set({
      attempts: sql`${notifications.attempts} + 1`,
      lastError: error,
      ...(isLast ? { state: 'failed' as const } : {}),
    })
    .where(
      and(
        eq(notifications.clinicId, actor.clinicId),
        eq(notifications.id, notificationId),
        eq(notifications.state, 'pending'),
      ),
    );
};
