import { and, eq, sql } from 'drizzle-orm';
import type { Message, ThreadDetail, ThreadSummary } from '#shared/threads/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening, writeAudit } from '../audit/service.ts';
import { announceThread, appendMessage, seeUpTo } from './append.ts';
import { holdPatient } from './people.ts';
import { messagesAfter, participantsOf, summariesVisibleTo, summaryOf, threadVisibleTo } from './queries.ts';
import { detailOf, toMessage, toSummary } from './view.ts';

export const listThreadsFor = async (tx: Tx, actor: PersonActor, now: Date): Promise<ThreadSummary[]> => {
  const rows = await summariesVisibleTo(tx, actor);
  await writeAudit(tx, actor, { action: 'threads.listed', detail: { count: rows.length } }, now);
  return rows.map((row) => toSummary(row, now));
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

export const addMessage = async (
  tx: Tx,
  actor: PersonActor,
  input: { threadId: string; id: string; text: string },
  now: Date,
): Promise<Message> => appendMessage(tx, actor, await threadVisibleTo(tx, actor, input.threadId), input, now);

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
  await announceThread(tx, thread, await holdPatient(tx, thread, now), thread.lastSequence);
  return { seenSequence: mine.seenSequence, seenAt: (mine.seenAt ?? now).toISOString() };
};

export const endThread = async (
  tx: Tx,
  actor: PersonActor,
  threadId: string,
  now: Date,
): Promise<ThreadSummary> => {
  const thread = await threadVisibleTo(tx, actor, threadId);
  // The patient's row before the thread's, as everywhere.
  const patient = await holdPatient(tx, thread, now);
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
  await announceThread(tx, thread, patient, thread.lastSequence);
  return toSummary(await summaryOf(tx, actor, threadId), now);
};
