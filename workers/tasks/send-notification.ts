import type { Pools } from '#server/db/pools.ts';
import { withTx } from '#server/db/with-tx.ts';
import type { JobPayload } from '#server/jobs/queues.ts';
import type { Mailer } from '#server/notifications/mailer.ts';
import { markSent, markTryFailed, pendingNotification } from '#server/notifications/service.ts';

/** What a failed try may be remembered by: the kind of failure, never the words of a foreign server. */
const failureOf = (error: unknown): string =>
  error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : 'unknown';

/**
 * Sends one notification: read the pending row, send outside the transaction, mark the row. A crash between
 * sending and marking sends it again: at least once, under the same message id.
 */
export const sendNotificationTask = async (
  { app }: Pools,
  mailer: Mailer,
  { clinicId, notificationId }: JobPayload<'send-notification'>,
  { now, isLastTry }: { now: Date; isLastTry: boolean },
): Promise<void> => {
  const actor = { kind: 'system', clinicId } as const;
  const pending = await withTx(app, actor, (tx) => pendingNotification(tx, actor, notificationId));
  if (!pending) return;
  try {
    await mailer.send(pending);
  } catch (error) {
    await withTx(app, actor, (tx) =>
      markTryFailed(tx, actor, notificationId, { error: failureOf(error), isLast: isLastTry }),
    );
    throw error;
  }
  await withTx(app, actor, (tx) => markSent(tx, actor, notificationId, now));
};
