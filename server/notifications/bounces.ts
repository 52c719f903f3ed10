import { and, eq, inArray, sql } from 'drizzle-orm';
import type pg from 'pg';
import { notifications } from '../db/schema/notifications.ts';
import { people } from '../db/schema/people.ts';
import { withTx, type Tx } from '../db/with-tx.ts';
import { isNotification } from './claiming.ts';
import { readDeliveryStatus, type DeliveryStatus } from './delivery-status.ts';
import { messageIdDomain } from './email.ts';

const idIn = (messageId: string): string | null => {
  const [id = '', domain] = messageId.toLowerCase().split('@');
  return domain === messageIdDomain && /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(id) ? id : null;
};

/** Marks the mail, and the address where it is still this person's and refuses for good. */
const markCameBack = async (
  tx: Tx,
  { clinicId, id }: { clinicId: string; id: string },
  failed: DeliveryStatus['failed'],
  now: Date,
): Promise<boolean> => {
  const marked = await tx
    .update(notifications)
    .set({ state: 'bounced', outcome: 'came-back' })
    .where(
      and(isNotification(clinicId, id), eq(notifications.channel, 'email'), eq(notifications.state, 'sent')),
    )
    .returning({ personId: notifications.personId });
  const [row] = marked;
  if (!row) return false;
  const refused = failed.filter(({ isPermanent }) => isPermanent).flatMap(({ addresses }) => addresses);
  if (refused.length > 0) {
    await tx
      .update(people)
      .set({ emailBouncedAt: now })
      .where(
        and(
          eq(people.clinicId, clinicId),
          eq(people.id, row.personId),
          inArray(sql`lower(${people.email})`, refused),
        ),
      );
  }
  return true;
};

/**
 * Takes a report of a mail that came back. It names the mail by its message id alone, so each clinic is asked
 * whether it is theirs. False where it is no such report, or about no mail that was sent from here.
 */
export const noteBounce = async (app: pg.Pool, report: string, now: Date): Promise<boolean> => {
  const status = readDeliveryStatus(report);
  const id = status && idIn(status.messageId);
  if (!id) return false;
  const { rows } = await withTx(app, { kind: 'anonymous' }, (tx) =>
    tx.execute<{ clinic_id: string }>(sql`select clinic_id from all_clinic_ids()`),
  );
  for (const { clinic_id: clinicId } of rows) {
    const isTheirs = await withTx(app, { kind: 'system', clinicId }, (tx) =>
      markCameBack(tx, { clinicId, id }, status.failed, now),
    );
    if (isTheirs) return true;
  }
  return false;
};
