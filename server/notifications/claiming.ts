import { and, eq, isNull, lte, or, sql } from 'drizzle-orm';
import { notifications } from '../db/schema/notifications.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import type { Outgoing } from './channels.ts';
import { subscriptionOf } from './push-subscriptions.ts';
import { stillReminds } from './reminders.ts';

type Row = typeof notifications.$inferSelect;

/** A row that one worker tries to send, and nobody else for as long as the lease holds. */
export type Claimed = { row: Row; leasedUntil: Date; outgoing: Outgoing };

/** Longer than any try may take (see `tryForMs` of the delivery). */
const leaseMs = 60_000;

export const isNotification = (clinicId: string, id: string) =>
  and(eq(notifications.clinicId, clinicId), eq(notifications.id, id));

/** What is to be sent now, or null where there is nobody, no device or no reason left to send it to. */
const outgoingOf = async (tx: Tx, row: Row, now: Date): Promise<Outgoing | null> => {
  const { clinicId, personId, id, kind, channel, path, target } = row;
  const rows = await tx
    .select({ email: people.email, phone: people.phone })
    .from(people)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId), eq(people.active, true)));
  const person = rows[0];
  if (!person) return null;
  if (kind === 'check-in-reminder' && !(await stillReminds(tx, row, now))) return null;
  if ((channel === 'sms' || channel === 'phone') && !person.phone) return null;
  const subscription =
    channel === 'push' ? await subscriptionOf(tx, clinicId, { id: target, personId }) : null;
  if (channel === 'push' && !subscription) return null;
  return { id, clinicId, kind, channel, path, ...person, subscription };
};

/**
 * Takes a row that is due, by one guarded update: of any number of workers one gets it. What has become pointless
 * is dropped, so that it does not wait for ever.
 */
export const claim = async (
  tx: Tx,
  { clinicId, id }: { clinicId: string; id: string },
  now: Date,
): Promise<Claimed | 'dropped' | null> => {
  const leasedUntil = new Date(now.getTime() + leaseMs);
  const rows = await tx
    .update(notifications)
    .set({ leasedUntil, attempts: sql`${notifications.attempts} + 1` })
    .where(
      and(
        isNotification(clinicId, id),
        eq(notifications.state, 'pending'),
        lte(notifications.dueAt, now),
        or(isNull(notifications.leasedUntil), lte(notifications.leasedUntil, now)),
      ),
    )
    .returning();
  const row = rows[0];
  if (!row) return null;
  const outgoing = await outgoingOf(tx, row, now);
  if (outgoing) return { row, leasedUntil, outgoing };
  await tx
    .update(notifications)
    .set({ state: 'dropped', leasedUntil: null, lastError: null })
    .where(isNotification(clinicId, id));
  return 'dropped';
};

/** The ids of what is due, in whichever clinic, the most urgent first. */
export const dueNotifications = async (
  tx: Tx,
  now: Date,
  atMost: number,
): Promise<{ clinicId: string; id: string }[]> => {
  const { rows } = await tx.execute<{ clinic_id: string; id: string }>(
    sql`select clinic_id, id from due_notifications(${now.toISOString()}, ${atMost})`,
  );
  return rows.map(({ clinic_id: clinicId, id }) => ({ clinicId, id }));
};
