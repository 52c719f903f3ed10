import { sql } from 'drizzle-orm';
import { kindRules, type NotificationChannel, type NotificationKind } from '#shared/notifications/kinds.ts';
import type { Tx } from '../db/with-tx.ts';
import { enqueue } from '../jobs/enqueue.ts';
import { channelsFor } from './choices.ts';
import { endOfQuiet } from './quiet-hours.ts';
import { recipientsOf, type Recipient } from './recipients.ts';

export type Occasion = {
  kind: NotificationKind;
  /** Ids and numbers only; the same occasion notifies a person once, however often it is reported. */
  occasion: string;
  /** Where the link leads, below the public address. For a one-time link the fragment is its id, not its secret. */
  path: string;
};

type NotifyOptions = {
  /** These and no others, whatever was chosen; those on which a person cannot be reached are left out. */
  channels?: readonly NotificationChannel[];
  /** For push: this browser alone. */
  subscriptionId?: string;
};

/** What was written less than this before it is given up takes nothing more on. */
const joinsForMs = 12 * 60 * 60_000;

/** A telephone rings for one thing once in this time. */
const ringsAgainAfterMs = 5 * 60_000;

type Wanted = { person_id: string; channel: NotificationChannel; target: string; due_at: string };

const wantedFor = (
  recipient: Recipient,
  kind: NotificationKind,
  now: Date,
  { channels, subscriptionId }: NotifyOptions,
): Wanted[] => {
  const { personId, quiet, timeZone, choices, reachable, subscriptionIds } = recipient;
  const chosen = channels
    ? reachable.filter((channel) => channels.includes(channel))
    : channelsFor(kind, choices, reachable);
  const targets = subscriptionIds.filter((id) => subscriptionId === undefined || id === subscriptionId);
  const due = kindRules[kind].passesQuietHours ? now : endOfQuiet(quiet, timeZone, now);
  return chosen.flatMap((channel) =>
    (channel === 'push' ? targets : ['']).map((target) => ({
      person_id: personId,
      channel,
      target,
      due_at: due.toISOString(),
    })),
  );
};

/**
 * Writes a pending row for each person, channel and device, in the transaction of what they are told about, and a
 * job that says so for what is due at once. Gives the ids of the rows written.
 *
 * Many occasions of one kind about one thing are told once while they wait: an occasion joins a row that nobody
 * has begun to send, and takes that row's lock, so that it cannot go out before the occasion is there to be read.
 * A row that is just being sent is not joined: the new occasion gets its own.
 */
export const notify = async (
  tx: Tx,
  clinicId: string,
  personIds: readonly string[],
  { kind, occasion, path }: Occasion,
  now: Date,
  options: NotifyOptions = {},
): Promise<string[]> => {
  if (personIds.length === 0) return [];
  const recipients = await recipientsOf(tx, clinicId, personIds, kind);
  const wanted = recipients.flatMap((recipient) => wantedFor(recipient, kind, now, options));
  if (wanted.length === 0) return [];
  const at = now.toISOString();
  const sameThing = (row: string) =>
    sql.raw(`${row}.person_id = w.person_id and ${row}.channel = w.channel and ${row}.target = w.target`);
  const written = await tx.execute<{ id: string; due_at: string }>(sql`
    with wanted as (
      select * from jsonb_to_recordset(${JSON.stringify(wanted)}::jsonb)
        as w(person_id uuid, channel text, target text, due_at timestamptz)
    ), joined as (
      update notifications n set due_at = least(n.due_at, w.due_at)
      from wanted w
      where n.clinic_id = ${clinicId} and ${sameThing('n')} and n.kind = ${kind} and n.path = ${path}
        and n.occasion <> ${occasion} and n.state = 'pending'
        and (n.leased_until is null or n.leased_until <= ${at})
        and n.created_at > ${new Date(now.getTime() - joinsForMs).toISOString()}
      returning n.person_id, n.channel, n.target
    )
    insert into notifications (clinic_id, person_id, channel, target, kind, occasion, path, created_at, due_at)
    select ${clinicId}::uuid, w.person_id, w.channel, w.target, ${kind}, ${occasion}, ${path}, ${at}::timestamptz,
      w.due_at
    from wanted w
    where not exists (select from joined j where ${sameThing('j')})
      and not (w.channel in ('sms', 'phone') and exists (
        select from notifications n
        where n.clinic_id = ${clinicId} and ${sameThing('n')} and n.kind = ${kind} and n.path = ${path}
          and n.state in ('pending', 'sent')
          and n.created_at > ${new Date(now.getTime() - ringsAgainAfterMs).toISOString()}
      ))
    on conflict do nothing
    returning id, due_at`);
  // The most urgent first, and all before what has no job: 0 is what a job has that says nothing.
  const priority = 10 - kindRules[kind].rank;
  for (const { id, due_at: dueAt } of written.rows) {
    if (new Date(dueAt) > now) continue;
    await enqueue(tx, 'send-notification', { clinicId, notificationId: id }, { key: id, priority });
  }
  return written.rows.map(({ id }) => id);
};
