import { and, eq } from 'drizzle-orm';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { threadParticipants, threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { AuditFact } from '../audit/service.ts';
import { messageRecord } from '../caregivers/limits.ts';
import { appendMessage } from './append.ts';
import { holdPatient } from './people.ts';
import { messageByClientId, sideIn, type ThreadRow } from './queries.ts';
import { detailOf } from './view.ts';

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

/** A patient, or a caregiver who may, opens a thread with its first message. A repeat with the same ids and words is the same thread. */
export const startThread = async (
  tx: Tx,
  actor: PersonActor,
  input: { id: string; subject: string; message: { id: string; text: string } },
  now: Date,
): Promise<ThreadDetail> => {
  const patientId = messageRecord(actor);
  if (!patientId)
    throw new Problem('forbidden', 'Only a patient, or who may write for one, starts a thread here.');
  const patient = await holdPatient(tx, { clinicId: actor.clinicId, patientId }, now);
  const made = await insertThread(
    tx,
    actor,
    {
      patientId,
      patientPersonId: patient.personId,
      clientId: input.id,
      subject: input.subject,
      flagId: null,
    },
    now,
  );
  const thread = made ?? (await ownThreadByClientId(tx, actor, input.id));
  if (thread.subject !== input.subject || thread.patientId !== patientId) throw new Problem('id-conflict');
  if (!made) {
    const author = { clinicId: actor.clinicId, authorId: actor.personId, clientId: input.message.id };
    const first = await messageByClientId(tx, author);
    if (first?.threadId !== thread.id) throw new Problem('id-conflict');
  }
  await appendMessage(tx, actor, thread, input.message, now);
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
  if (made) return appendMessage(tx, actor, made, message, now, recordedAs);
  const rows = await tx
    .select()
    .from(threads)
    .where(and(eq(threads.clinicId, actor.clinicId), eq(threads.flagId, flag.id)));
  const thread = rows[0];
  if (!thread) throw new Problem('state-conflict');
  return appendMessage(tx, actor, thread, message, now, recordedAs);
};
