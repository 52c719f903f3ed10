import { and, eq, isNotNull } from 'drizzle-orm';
import { kindRules, type NotificationChannel } from '#shared/notifications/kinds.ts';
import type { Pools } from '../db/pools.ts';
import { notifications } from '../db/schema/notifications.ts';
import { people } from '../db/schema/people.ts';
import { withTx, type Tx } from '../db/with-tx.ts';
import { NotDeliverable, type Channel, type Outgoing, type Sent } from './channels.ts';
import { claim, isNotification, type Claimed } from './claiming.ts';
import { withLinkSecret } from './one-time-links.ts';
import { forgetSubscription, notePushSent } from './push-subscriptions.ts';
import { nextTry } from './retries.ts';
import { notify } from './service.ts';

/** What a worker sends with. */
export type DeliveryTools = {
  pools: Pools;
  channels: Record<NotificationChannel, Channel>;
  tokenSecret: string;
};

/** A gateway that answers slower than this has failed; well inside the lease, so that nobody else tries meanwhile. */
const tryForMs = 45_000;

const sendInTime = async (channel: Channel, outgoing: Outgoing): Promise<Sent> => {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => reject(Object.assign(new Error('Too slow.'), { code: 'timeout' })), tryForMs);
  });
  try {
    return await Promise.race([channel.send(outgoing), tooLate]);
  } finally {
    clearTimeout(timer);
  }
};

/** What a failed try may be remembered by: the kind of failure, never the words of a foreign server. */
const failureOf = (error: unknown): string => {
  if (!(error instanceof Error)) return 'unknown';
  const code = 'code' in error ? String(error.code) : error.name;
  return /^[\w-]{1,40}$/.test(code) ? code : 'unknown';
};

const personOfRow = ({ clinicId, personId }: Claimed['row']) =>
  and(eq(people.clinicId, clinicId), eq(people.id, personId));

const markSent = async (tx: Tx, { row, outgoing }: Claimed, sent: Sent, now: Date): Promise<void> => {
  await tx
    .update(notifications)
    .set({ state: 'sent', sentAt: now, leasedUntil: null, lastError: null, providerId: sent.providerId })
    .where(
      and(
        isNotification(row.clinicId, row.id),
        eq(notifications.state, 'pending'),
        // Without a lease the gateway was faster, and has said already that the call must be made again.
        isNotNull(notifications.leasedUntil),
      ),
    );
  if (row.channel === 'push') await notePushSent(tx, row.clinicId, row.target, now);
  if (row.channel === 'email') {
    await tx
      .update(people)
      .set({ emailBouncedAt: null })
      .where(and(personOfRow(row), eq(people.email, outgoing.email), isNotNull(people.emailBouncedAt)));
  }
};

/** Unless the lease ran out and somebody else is trying by now. */
const mark = async (
  tx: Tx,
  { row, leasedUntil }: Claimed,
  change: Partial<typeof notifications.$inferInsert>,
): Promise<void> => {
  await tx
    .update(notifications)
    .set({ leasedUntil: null, ...change })
    .where(
      and(
        isNotification(row.clinicId, row.id),
        eq(notifications.state, 'pending'),
        eq(notifications.leasedUntil, leasedUntil),
      ),
    );
};

/** That browser wakes nobody any more. A page that was to wake somebody there looks for another way. */
const markGone = async (tx: Tx, claimed: Claimed, now: Date): Promise<void> => {
  const { clinicId, personId, kind, occasion, path, target } = claimed.row;
  await mark(tx, claimed, { state: 'dropped', lastError: 'gone' });
  await forgetSubscription(tx, clinicId, target);
  if (kindRules[kind].mustReach) await notify(tx, clinicId, [personId], { kind, occasion, path }, now);
};

const markNotDeliverable = async (
  tx: Tx,
  claimed: Claimed,
  reason: NotDeliverable['reason'],
  now: Date,
): Promise<void> => {
  const { row, outgoing } = claimed;
  if (reason === 'gone' && row.channel === 'push') return markGone(tx, claimed, now);
  await mark(tx, claimed, { state: reason === 'bounced' ? 'bounced' : 'failed', lastError: reason });
  if (reason === 'bounced' && row.channel === 'email') {
    await tx
      .update(people)
      .set({ emailBouncedAt: now })
      .where(and(personOfRow(row), eq(people.email, outgoing.email)));
  }
};

const markTryFailed = async (tx: Tx, claimed: Claimed, error: unknown, now: Date): Promise<void> => {
  const again = nextTry(claimed.row, now);
  const change = again ? { dueAt: again } : { state: 'failed' as const };
  await mark(tx, claimed, { ...change, lastError: failureOf(error) });
};

/** Sends what was claimed, outside any transaction, and marks what came of it. */
const sendClaimed = async (tools: DeliveryTools, claimed: Claimed, clock: () => Date): Promise<void> => {
  const { clinicId, channel } = claimed.row;
  const inClinic = (run: (tx: Tx) => Promise<void>) =>
    withTx(tools.pools.app, { kind: 'system', clinicId }, run);
  const { gate } = tools.pools;
  const outgoing = await withLinkSecret({ gate, tokenSecret: tools.tokenSecret }, claimed.outgoing, clock());
  if (!outgoing) {
    await inClinic((tx) => mark(tx, claimed, { state: 'dropped', lastError: 'link-spent' }));
    return;
  }
  const taken = { ...claimed, outgoing };
  let sent: Sent;
  try {
    sent = await sendInTime(tools.channels[channel], outgoing);
  } catch (error) {
    const now = clock();
    await inClinic((tx) =>
      error instanceof NotDeliverable
        ? markNotDeliverable(tx, taken, error.reason, now)
        : markTryFailed(tx, taken, error, now),
    );
    return;
  }
  await inClinic((tx) => markSent(tx, taken, sent, clock()));
};

/**
 * Sends one notification if it is due and nobody else is at it: claimed in a short transaction, sent outside any,
 * then marked. A crash between sending and marking sends it again when the lease has run out: at least once, under
 * the same message id. `onClaimed` is told before the sending. Gives whether there was something to do.
 */
export const deliver = async (
  tools: DeliveryTools,
  due: { clinicId: string; id: string },
  clock: () => Date,
  onClaimed: () => void = () => undefined,
): Promise<boolean> => {
  const actor = { kind: 'system', clinicId: due.clinicId } as const;
  const claimed = await withTx(tools.pools.app, actor, (tx) => claim(tx, due, clock()));
  if (claimed === null) return false;
  onClaimed();
  if (claimed !== 'dropped') await sendClaimed(tools, claimed, clock);
  return true;
};
