import { and, eq, sql } from 'drizzle-orm';
import { pushSubscriptions } from '../db/schema/notifications.ts';
import type { Tx } from '../db/with-tx.ts';

/** A browser that lets itself be woken, as whatever sends to it needs to know it. */
type PushTarget = { id: string; endpoint: string; p256dh: string; auth: string };

const targetColumns = {
  id: pushSubscriptions.id,
  endpoint: pushSubscriptions.endpoint,
  p256dh: pushSubscriptions.p256dh,
  auth: pushSubscriptions.auth,
};

const isSubscription = (clinicId: string, id: string) =>
  and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.id, id));

/** One browser of somebody, unless it was signed out, taken over by the next user, or gone in the meantime. */
export const subscriptionOf = async (
  tx: Tx,
  clinicId: string,
  { id, personId }: { id: string; personId: string },
): Promise<PushTarget | null> => {
  const rows = await tx
    .select(targetColumns)
    .from(pushSubscriptions)
    .where(and(isSubscription(clinicId, id), eq(pushSubscriptions.personId, personId)));
  return rows[0] ?? null;
};

/** A push was taken for that browser. */
export const notePushSent = async (tx: Tx, clinicId: string, id: string, now: Date): Promise<void> => {
  await tx.update(pushSubscriptions).set({ lastSentAt: now }).where(isSubscription(clinicId, id));
};

/** The push service no longer knows that browser. */
export const forgetSubscription = async (tx: Tx, clinicId: string, id: string): Promise<void> => {
  await tx.delete(pushSubscriptions).where(isSubscription(clinicId, id));
};

/**
 * Held until the transaction ends by whoever adds a subscription or removes those of a session or person that is
 * over: one that was on its way meanwhile is either seen and removed, or finds that its session has ended.
 */
export const holdSubscriptions = async (tx: Tx, sessionOrPersonId: string): Promise<void> => {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`push:${sessionOrPersonId}`}, 0))`);
};

/** A shared device wakes nobody's successor: with the session goes what it let be woken. End the session first. */
export const forgetPushOfSession = async (tx: Tx, clinicId: string, sessionId: string): Promise<void> => {
  await holdSubscriptions(tx, sessionId);
  await tx
    .delete(pushSubscriptions)
    .where(and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.sessionId, sessionId)));
};

/** Somebody whose access ended is woken nowhere. End the sessions first. */
export const forgetPushOfPerson = async (tx: Tx, clinicId: string, personId: string): Promise<void> => {
  await holdSubscriptions(tx, personId);
  await tx
    .delete(pushSubscriptions)
    .where(and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.personId, personId)));
};
