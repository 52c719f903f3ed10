import { and, eq, inArray, sql } from 'drizzle-orm';
import { kindRules } from '#shared/notifications/kinds.ts';
import { notifications } from '../db/schema/notifications.ts';
import type { Tx } from '../db/with-tx.ts';
import { writeAudit } from '../features/audit/service.ts';

/** A call that nobody took is made again after this pause, for as long as a page is fresh. */
const againAfterMs = 60_000;
const freshForMs = 30 * 60_000;

/** What the gateway says of a call or an SMS at its end, in our words. Anything else is on the way still. */
const outcomes: Record<string, string> = {
  completed: 'answered',
  'no-answer': 'no-answer',
  busy: 'busy',
  failed: 'failed',
  canceled: 'failed',
  delivered: 'delivered',
  undelivered: 'undelivered',
};
const reached = new Set(['answered', 'delivered']);

type Named = { clinicId: string; notificationId: string };

/** The row of a call or an SMS, held until the transaction ends. */
const lockedRow = async (tx: Tx, { clinicId, notificationId }: Named) => {
  const rows = await tx
    .select()
    .from(notifications)
    .where(
      and(
        eq(notifications.clinicId, clinicId),
        eq(notifications.id, notificationId),
        inArray(notifications.channel, ['phone', 'sms']),
      ),
    )
    .for('update');
  return rows[0] ?? null;
};

const change = async (tx: Tx, { clinicId, notificationId }: Named, values: object): Promise<void> => {
  await tx
    .update(notifications)
    .set({ ...values, leasedUntil: null })
    .where(and(eq(notifications.clinicId, clinicId), eq(notifications.id, notificationId)));
};

/**
 * What became of a call or an SMS. A page that nobody took is due again while it is fresh; whatever else did not
 * arrive stays as failed, for the administrator to see. The word may come before the worker has marked the row,
 * so it counts for a pending row too; once marked, only for the try that the row names.
 */
export const noteGatewayStatus = async (
  tx: Tx,
  named: Named,
  { sid, status }: { sid: string; status: string },
  now: Date,
): Promise<void> => {
  const outcome = outcomes[status];
  const row = await lockedRow(tx, named);
  if (!row || outcome === undefined || row.acknowledgedAt !== null) return;
  if (row.state !== 'pending' && (row.state !== 'sent' || row.providerId !== sid)) return;
  if (reached.has(outcome)) {
    const sentAt = row.sentAt ?? now;
    await change(tx, named, { state: 'sent', sentAt, providerId: sid, outcome, lastError: null });
    return;
  }
  const isFresh = now.getTime() - row.createdAt.getTime() < freshForMs;
  const tryAgain = row.channel === 'phone' && kindRules[row.kind].mustReach && isFresh;
  await change(tx, named, {
    providerId: sid,
    lastError: outcome,
    ...(tryAgain
      ? { state: 'pending', outcome: null, dueAt: new Date(now.getTime() + againAfterMs) }
      : { state: 'failed', outcome }),
  });
};

/** Somebody pressed the key: they have heard it, whatever is said of that call later. */
export const noteKeyPress = async (tx: Tx, named: Named, now: Date): Promise<void> => {
  const row = await lockedRow(tx, named);
  if (row?.channel !== 'phone' || row.acknowledgedAt !== null) return;
  await change(tx, named, {
    state: 'sent',
    sentAt: sql`coalesce(${notifications.sentAt}, ${now.toISOString()}::timestamptz)`,
    outcome: 'acknowledged',
    acknowledgedAt: now,
    lastError: null,
  });
  const actor = { kind: 'system', clinicId: named.clinicId } as const;
  await writeAudit(tx, actor, { action: 'page.acknowledged', subjectId: named.notificationId }, now);
};
