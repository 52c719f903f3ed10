import { and, eq, gt, sql } from 'drizzle-orm';
import type { Message, ThreadDetail, ThreadSummary } from '#shared/threads/contract.ts';
import { isOpenAt, nextOpening } from '#shared/clinic/hours.ts';
import { dayPostOp, localDateIn } from '#shared/plans/calendar.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { messages, threadParticipants, threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';
import { announce } from '../../realtime/announce.ts';
import { auditOpening, writeAudit, type AuditFact } from '../audit/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import {
  lockThread,
  messageByClientId,
  messagesAfter,
  participantsOf,
  sideIn,
  summariesVisibleTo,
  summaryOf,
  threadVisibleTo,
  watchersOf,
  type MessageRow,
  type SummaryRow,
  type ThreadRow,
} from './queries.ts';

const toMessage = ({ authorId, authorName, authorSide, sentAt, ...row }: MessageRow): Message => ({
  ...row,
  author:
    authorId && authorName && authorSide ? { personId: authorId, name: authorName, side: authorSide } : null,
  sentAt: sentAt.toISOString(),
});

const toSummary = (row: SummaryRow, now: Date): ThreadSummary => ({
  id: row.id,
  subject: row.subject,
  state: row.state,
  patient: {
    id: row.patientId,
    name: row.patientName,
    day: dayPostOp(row.surgeryDate, localDateIn(row.timeZone, now)),
  },
  lastSequence: row.lastSequence,
  lastText: row.lastText,
  lastAt: row.lastAt.toISOString(),
  unseen: row.unseen,
  flagId: row.flagId,
});

export const listThreadsFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<ThreadSummary[]> => {
  const rows = await summariesVisibleTo(tx, actor);
  await writeAudit(tx, actor, { action: 'threads.listed', detail: { count: rows.length } }, now);
  return rows.map((row) => toSummary(row, now));
};

const detailOf = async (tx: Tx, actor: PersonActor, threadId: string, now: Date): Promise<ThreadDetail> => {
  const summary = toSummary(await summaryOf(tx, actor, threadId), now);
  const participants = await participantsOf(tx, actor.clinicId, threadId);
  return {
    ...summary,
    participants: participants.map((one) => ({ ...one, seenAt: one.seenAt?.toISOString() ?? null })),
  };
};

export const openThread = async (
  tx: Tx,
  actor: PersonActor,
  threadId: string,
  now: Date,
): Promise<ThreadDetail> => {
  const thread = await threadVisibleTo(tx, actor, threadId);
  await auditOpening(
    tx,
    actor,
    { action: 'thread.opened', subjectId: threadId, patientId: thread.patientId },
    now,
  );
  return detailOf(tx, actor, threadId, now);
};

/** Catching up on an open thread: everything after a sequence, in order, a page at a time. */
export const readMessages = async (tx: Tx, actor: PersonActor, threadId: string, after: number) => {
  const thread = await threadVisibleTo(tx, actor, threadId);
  const rows = await messagesAfter(tx, thread, Math.min(after, thread.lastSequence));
  return { messages: rows.map(toMessage), lastSequence: thread.lastSequence };
};

/** Marks how far someone has seen; never backwards. */
const seeUpTo = async (tx: Tx, thread: ThreadRow, actor: PersonActor, sequence: number, now: Date) => {
  await tx
    .insert(threadParticipants)
    .values({
      clinicId: thread.clinicId,
      threadId: thread.id,
      personId: actor.personId,
      side: sideIn(thread, actor),
      seenSequence: sequence,
      seenAt: now,
    })
    .onConflictDoUpdate({
      target: [threadParticipants.clinicId, threadParticipants.threadId, threadParticipants.personId],
      set: { seenSequence: sequence, seenAt: now },
      setWhere: sql`${threadParticipants.seenSequence} < ${sequence}`,
    });
};

/**
 * Writing makes somebody a participant. It counts as having seen the thread only where they had seen all of it
 * before: what came while they wrote has not been on their screen.
 */
const takePart = async (tx: Tx, thread: ThreadRow, actor: PersonActor, upTo: number, now: Date) => {
  const isFirst = thread.lastSequence === 0;
  await tx
    .insert(threadParticipants)
    .values({
      clinicId: thread.clinicId,
      threadId: thread.id,
      personId: actor.personId,
      side: sideIn(thread, actor),
      ...(isFirst ? { seenSequence: upTo, seenAt: now } : {}),
    })
    .onConflictDoUpdate({
      target: [threadParticipants.clinicId, threadParticipants.threadId, threadParticipants.personId],
      set: { seenSequence: upTo, seenAt: now },
      setWhere: sql`${threadParticipants.seenSequence} >= ${thread.lastSequence}`,
    });
};

const announceThread = async (tx: Tx, thread: ThreadRow, sequence: number) => {
  const watchers = await watchersOf(tx, thread);
  for (const { personId } of watchers) {
    await announce(tx, { person: personId }, { topic: 'thread', threadId: thread.id, sequence });
  }
  return watchers;
};

const noteEveryMs = 12 * 60 * 60 * 1000;

const openingWords = (opensAt: Date | null, timeZone: string): string =>
  opensAt
    ? new Intl.DateTimeFormat('en-US', {
        timeZone,
        weekday: 'long',
        hour: '2-digit',
        minute: '2-digit',
        hourCycle: 'h23',
      }).format(opensAt)
    : 'the next working day';

/** Out of hours the thread says once that nobody watches it, when the clinic is back, and when to call instead. */
const noteOutOfHours = async (tx: Tx, thread: ThreadRow, sequence: number, now: Date): Promise<number> => {
  const clinic = await clinicOf(tx, thread.clinicId);
  if (isOpenAt(clinic.openingHours, clinic.timeZone, now)) return sequence;
  const recentNote = await tx.$count(
    messages,
    and(
      eq(messages.clinicId, thread.clinicId),
      eq(messages.threadId, thread.id),
      eq(messages.kind, 'note'),
      gt(messages.sentAt, new Date(now.getTime() - noteEveryMs)),
    ),
  );
  if (recentNote > 0) return sequence;
  const opens = openingWords(nextOpening(clinic.openingHours, clinic.timeZone, now), clinic.timeZone);
  await tx.insert(messages).values({
    clinicId: thread.clinicId,
    threadId: thread.id,
    sequence: sequence + 1,
    kind: 'note',
    text:
      `The clinic is closed and opens ${opens}. This thread is not watched until then. ` +
      `If it cannot wait, call ${clinic.onCallNumber}; in an emergency call ${clinic.emergencyNumber}.`,
    sentAt: now,
  });
  return sequence + 1;
};

const append = async (
  tx: Tx,
  actor: PersonActor,
  visible: Pick<ThreadRow, 'clinicId' | 'id'>,
  { id: clientId, text }: { id: string; text: string },
  now: Date,
  recordedAs: (messageId: string) => AuditFact = (subjectId) => ({
    action: 'thread.message-posted',
    subjectId,
  }),
): Promise<Message> => {
  // The thread's row first: it hands out the sequence, and a repeat waits here until the first is decided.
  const thread = await lockThread(tx, visible);
  const author = { clinicId: actor.clinicId, authorId: actor.personId, clientId };
  const earlier = await messageByClientId(tx, author);
  if (earlier) {
    if (earlier.threadId === thread.id && earlier.text === text) return toMessage(earlier);
    throw new Problem('id-conflict');
  }
  const sequence = thread.lastSequence + 1;
  const side = sideIn(thread, actor);
  const inserted = await tx
    .insert(messages)
    .values({
      ...author,
      threadId: thread.id,
      sequence,
      kind: 'message',
      authorSide: side,
      text,
      sentAt: now,
    })
    .onConflictDoNothing({ target: [messages.clinicId, messages.authorId, messages.clientId] })
    .returning({ id: messages.id });
  // The same id was sent into another thread at the same moment.
  if (inserted.length === 0) throw new Problem('id-conflict');
  const lastSequence = side === 'patient' ? await noteOutOfHours(tx, thread, sequence, now) : sequence;
  await tx
    .update(threads)
    .set({ lastSequence, lastAt: now, state: side === 'patient' ? 'waiting-on-us' : 'waiting-on-patient' })
    .where(and(eq(threads.clinicId, thread.clinicId), eq(threads.id, thread.id)));
  await takePart(tx, thread, actor, lastSequence, now);
  const written = await messageByClientId(tx, author);
  if (!written) throw new Error('A message that was just written is not there.');

  await writeAudit(tx, actor, { ...recordedAs(written.id), patientId: thread.patientId }, now);
  const watchers = await announceThread(tx, thread, lastSequence);
  const [patientPersonId, teamIds] = await receiversOf(tx, thread, watchers);
  const occasion = { kind: 'new-message', occasion: `message:${written.id}` } as const;
  if (side === 'clinic') {
    await notify(
      tx,
      thread.clinicId,
      [patientPersonId],
      { ...occasion, path: `/messages/${thread.id}` },
      now,
    );
    await announce(tx, { person: patientPersonId }, { topic: 'today' });
  } else {
    await notify(tx, thread.clinicId, teamIds, { ...occasion, path: `/clinic/messages/${thread.id}` }, now);
  }
  return toMessage(written);
};

const receiversOf = async (
  tx: Tx,
  thread: ThreadRow,
  watchers: { personId: string; isTeam: boolean }[],
): Promise<[patientPersonId: string, teamIds: string[]]> => {
  const participants = await participantsOf(tx, thread.clinicId, thread.id);
  const patient = participants.find(({ side }) => side === 'patient');
  if (!patient) throw new Error('A thread without its patient.');
  const team = watchers.filter(({ isTeam, personId }) => isTeam && personId !== patient.personId);
  return [patient.personId, team.map(({ personId }) => personId)];
};

export const addMessage = async (
  tx: Tx,
  actor: PersonActor,
  input: { threadId: string; id: string; text: string },
  now: Date,
): Promise<Message> => append(tx, actor, await threadVisibleTo(tx, actor, input.threadId), input, now);

type NewThread = {
  patientId: string;
  patientPersonId: string;
  clientId: string;
  subject: string;
  flagId: string | null;
};

const insertThread = async (
  tx: Tx,
  actor: PersonActor,
  thread: NewThread,
  now: Date,
): Promise<ThreadRow | null> => {
  const { patientPersonId, ...values } = thread;
  const rows = await tx
    .insert(threads)
    .values({
      clinicId: actor.clinicId,
      authorId: actor.personId,
      ...values,
      state: sideIn(thread, actor) === 'patient' ? 'waiting-on-us' : 'waiting-on-patient',
      lastAt: now,
      createdAt: now,
    })
    .onConflictDoNothing()
    .returning();
  const made = rows[0];
  if (!made) return null;
  await tx
    .insert(threadParticipants)
    .values({ clinicId: made.clinicId, threadId: made.id, personId: patientPersonId, side: 'patient' });
  return made;
};

/** A patient opens a thread with its first message. A repeat with the same ids and words is the same thread. */
export const startThread = async (
  tx: Tx,
  actor: PersonActor,
  input: { id: string; subject: string; message: { id: string; text: string } },
  now: Date,
): Promise<ThreadDetail> => {
  if (!actor.patientId) throw new Problem('forbidden', 'Only a patient starts a thread here.');
  const made = await insertThread(
    tx,
    actor,
    {
      patientId: actor.patientId,
      patientPersonId: actor.personId,
      clientId: input.id,
      subject: input.subject,
      flagId: null,
    },
    now,
  );
  const thread = made ?? (await ownThreadByClientId(tx, actor, input.id));
  if (thread.subject !== input.subject) throw new Problem('id-conflict');
  if (!made) {
    const author = { clinicId: actor.clinicId, authorId: actor.personId, clientId: input.message.id };
    const first = await messageByClientId(tx, author);
    if (first?.threadId !== thread.id) throw new Problem('id-conflict');
  }
  await append(tx, actor, thread, input.message, now);
  return detailOf(tx, actor, thread.id, now);
};

const ownThreadByClientId = async (tx: Tx, actor: PersonActor, clientId: string): Promise<ThreadRow> => {
  const rows = await tx
    .select()
    .from(threads)
    .where(
      and(
        eq(threads.clinicId, actor.clinicId),
        eq(threads.authorId, actor.personId),
        eq(threads.clientId, clientId),
      ),
    );
  const thread = rows[0];
  if (!thread) throw new Problem('state-conflict');
  return thread;
};

/** Writes to the patient about a flag. All replies about one flag stand in one thread, made by the first of them. */
export const replyAboutFlag = async (
  tx: Tx,
  actor: PersonActor,
  flag: { id: string; patientId: string; patientPersonId: string; subject: string },
  message: { id: string; text: string },
  now: Date,
): Promise<Message> => {
  const made = await insertThread(
    tx,
    actor,
    {
      patientId: flag.patientId,
      patientPersonId: flag.patientPersonId,
      clientId: flag.id,
      subject: flag.subject,
      flagId: flag.id,
    },
    now,
  );
  // One entry for the one write: that the flag was answered, and by which message.
  const recordedAs = (messageId: string): AuditFact => ({
    action: 'flag.replied',
    subjectId: flag.id,
    detail: { messageId },
  });
  if (made) return append(tx, actor, made, message, now, recordedAs);
  const rows = await tx
    .select()
    .from(threads)
    .where(and(eq(threads.clinicId, actor.clinicId), eq(threads.flagId, flag.id)));
  const thread = rows[0];
  if (!thread) throw new Problem('state-conflict');
  return append(tx, actor, thread, message, now, recordedAs);
};

export const seeThread = async (
  tx: Tx,
  actor: PersonActor,
  { threadId, sequence }: { threadId: string; sequence: number },
  now: Date,
) => {
  const thread = await threadVisibleTo(tx, actor, threadId);
  const upTo = Math.min(sequence, thread.lastSequence);
  await seeUpTo(tx, thread, actor, upTo, now);
  const rows = await participantsOf(tx, thread.clinicId, thread.id);
  const mine = rows.find(({ personId }) => personId === actor.personId);
  if (!mine) throw new Error('A participant that was just written is not there.');
  await writeAudit(
    tx,
    actor,
    { action: 'thread.seen', subjectId: thread.id, patientId: thread.patientId, detail: { sequence: upTo } },
    now,
  );
  await announceThread(tx, thread, thread.lastSequence);
  return { seenSequence: mine.seenSequence, seenAt: (mine.seenAt ?? now).toISOString() };
};

export const endThread = async (
  tx: Tx,
  actor: PersonActor,
  threadId: string,
  now: Date,
): Promise<ThreadSummary> => {
  const thread = await threadVisibleTo(tx, actor, threadId);
  const closed = await tx
    .update(threads)
    .set({ state: 'closed' })
    .where(
      and(
        eq(threads.clinicId, thread.clinicId),
        eq(threads.id, thread.id),
        sql`${threads.state} <> 'closed'`,
      ),
    )
    .returning({ id: threads.id });
  if (closed.length === 0) throw new Problem('state-conflict', 'This thread is closed already.');
  await writeAudit(
    tx,
    actor,
    { action: 'thread.closed', subjectId: thread.id, patientId: thread.patientId },
    now,
  );
  await announceThread(tx, thread, thread.lastSequence);
  return toSummary(await summaryOf(tx, actor, threadId), now);
};
