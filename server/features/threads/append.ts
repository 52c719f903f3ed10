import { and, eq, gt, sql } from 'drizzle-orm';
import { isOpenAt, nextOpening } from '#shared/clinic/hours.ts';
import type { Message } from '#shared/threads/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { messages, threadParticipants, threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';
import { announce } from '../../realtime/announce.ts';
import { writeAudit, type AuditFact } from '../audit/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import { answeringPeople, holdPatient, refuseUnwatched, watchersOf } from './people.ts';
import { lockThread, messageByClientId, sideIn, type ThreadRow } from './queries.ts';
import { toMessage } from './view.ts';

/** Marks how far someone has seen; never backwards. */
export const seeUpTo = async (tx: Tx, thread: ThreadRow, actor: PersonActor, sequence: number, now: Date) => {
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

export const announceThread = async (
  tx: Tx,
  thread: ThreadRow,
  patient: Parameters<typeof watchersOf>[2],
  sequence: number,
) => {
  const watchers = await watchersOf(tx, thread, patient);
  for (const personId of watchers.all) {
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

/**
 * Adds a message at the end of a thread's one order, and tells everybody whom it concerns. A repeat with the
 * same id and text is the message that stands already.
 */
export const appendMessage = async (
  tx: Tx,
  actor: PersonActor,
  visible: Pick<ThreadRow, 'clinicId' | 'id' | 'patientId'>,
  { id: clientId, text }: { id: string; text: string },
  now: Date,
  recordedAs: (messageId: string) => AuditFact = (subjectId) => ({
    action: 'thread.message-posted',
    subjectId,
  }),
): Promise<Message> => {
  const patient = await holdPatient(tx, visible, now);
  // The thread's row next: it hands out the sequence, and a repeat waits here until the first is decided.
  const thread = await lockThread(tx, visible);
  const author = { clinicId: actor.clinicId, authorId: actor.personId, clientId };
  const earlier = await messageByClientId(tx, author);
  if (earlier) {
    if (earlier.threadId === thread.id && earlier.text === text) return toMessage(earlier);
    throw new Problem('id-conflict');
  }
  const side = sideIn(thread, actor);
  await refuseUnwatched(tx, thread.clinicId, patient, side);
  const sequence = thread.lastSequence + 1;
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
  const watchers = await announceThread(tx, thread, patient, lastSequence);
  const occasion = { kind: 'new-message', occasion: `message:${written.id}` } as const;
  if (side === 'clinic') {
    const { clinicId, id, patientId } = thread;
    await notify(tx, clinicId, watchers.patientSide, { ...occasion, path: `/messages/${id}` }, now);
    await announce(tx, { patient: patientId }, { topic: 'today' });
  } else {
    const answering = await answeringPeople(tx, thread, watchers);
    await notify(tx, thread.clinicId, answering, { ...occasion, path: `/clinic/messages/${thread.id}` }, now);
  }
  return toMessage(written);
};
