import { and, asc, desc, eq, exists, gt, or, sql, type SQL } from 'drizzle-orm';
import { coversClinic, isClinician } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { careTeamMembers, operationCards, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import { messages, threadParticipants, threads } from '../../db/schema/threads.ts';
import type { Tx } from '../../db/with-tx.ts';
import { messageRecord } from '../caregivers/limits.ts';
import { relationshipTo } from '../caregivers/queries.ts';

export type ThreadRow = typeof threads.$inferSelect;

/**
 * On which side of a thread somebody stands: its patient on one, also where they work for the clinic, and there
 * too whoever acts for the patient.
 */
export const sideIn = (thread: Pick<ThreadRow, 'patientId'>, actor: PersonActor): 'patient' | 'clinic' =>
  thread.patientId === messageRecord(actor) ? 'patient' : 'clinic';

const ownThreads = (actor: PersonActor): SQL => {
  const patientId = messageRecord(actor);
  return patientId ? eq(threads.patientId, patientId) : sql`false`;
};

/** The threads an actor may see: a patient and those who act for them the patient's own; a clinician those of their care teams, those they take part in, or all. */
const visibleThreads = (tx: Tx, actor: PersonActor): SQL | undefined => {
  const inClinic = eq(threads.clinicId, actor.clinicId);
  if (!isClinician(actor.roles)) return and(inClinic, ownThreads(actor));
  if (coversClinic(actor.roles)) return inClinic;
  const onCareTeam = tx
    .select({ one: sql`1` })
    .from(careTeamMembers)
    .where(
      and(
        eq(careTeamMembers.clinicId, threads.clinicId),
        eq(careTeamMembers.patientId, threads.patientId),
        eq(careTeamMembers.personId, actor.personId),
      ),
    );
  const takesPart = tx
    .select({ one: sql`1` })
    .from(threadParticipants)
    .where(
      and(
        eq(threadParticipants.clinicId, threads.clinicId),
        eq(threadParticipants.threadId, threads.id),
        eq(threadParticipants.personId, actor.personId),
        // Whoever cared for the patient before stands on the patient's side, and sees nothing by that.
        eq(threadParticipants.side, 'clinic'),
      ),
    );
  return and(inClinic, or(ownThreads(actor), exists(onCareTeam), exists(takesPart)));
};

/** The one door to a thread. What is not visible does not exist. */
export const threadVisibleTo = async (tx: Tx, actor: PersonActor, threadId: string): Promise<ThreadRow> => {
  const rows = await tx
    .select()
    .from(threads)
    .where(and(visibleThreads(tx, actor), eq(threads.id, threadId)));
  const thread = rows[0];
  if (!thread) throw new Problem('not-found');
  return thread;
};

/** The same door, with the row locked: sequences are handed out one at a time. */
export const lockThread = async (tx: Tx, thread: Pick<ThreadRow, 'clinicId' | 'id'>): Promise<ThreadRow> => {
  const rows = await tx
    .select()
    .from(threads)
    .where(and(eq(threads.clinicId, thread.clinicId), eq(threads.id, thread.id)))
    .for('update');
  const locked = rows[0];
  if (!locked) throw new Problem('not-found');
  return locked;
};

const mySide = (actor: PersonActor): SQL =>
  sql`case when ${ownThreads(actor)} then 'patient' else 'clinic' end`;

/**
 * Messages of the other side that this person has not seen. A clinician who has never opened the thread counts
 * from the clinic's own last message, not from the beginning.
 */
const unseenBy = (actor: PersonActor): SQL<number> => sql<number>`(
  select count(*)::int from messages m
  where m.clinic_id = ${threads.clinicId} and m.thread_id = ${threads.id}
    and m.author_side is not null and m.author_side <> ${mySide(actor)}
    and m.sequence > coalesce(
      (select p.seen_sequence from thread_participants p
        where p.clinic_id = ${threads.clinicId} and p.thread_id = ${threads.id} and p.person_id = ${actor.personId}),
      (select max(own.sequence) from messages own
        where own.clinic_id = ${threads.clinicId} and own.thread_id = ${threads.id}
          and own.author_side = ${mySide(actor)}),
      0)
)`;

const summaryColumns = (actor: PersonActor) => ({
  id: threads.id,
  subject: threads.subject,
  state: threads.state,
  patientId: threads.patientId,
  patientName: people.name,
  timeZone: patients.timeZone,
  surgeryDate: operationCards.surgeryDate,
  lastSequence: threads.lastSequence,
  lastAt: threads.lastAt,
  lastText: sql<string>`coalesce((
    select m.text from messages m
    where m.clinic_id = ${threads.clinicId} and m.thread_id = ${threads.id} and m.kind = 'message'
    order by m.sequence desc limit 1), '')`,
  unseen: unseenBy(actor),
  flagId: threads.flagId,
});

const selectSummaries = (tx: Tx, actor: PersonActor) =>
  tx
    .select(summaryColumns(actor))
    .from(threads)
    .innerJoin(patients, and(eq(patients.clinicId, threads.clinicId), eq(patients.id, threads.patientId)))
    .innerJoin(people, and(eq(people.clinicId, patients.clinicId), eq(people.id, patients.personId)))
    .innerJoin(
      operationCards,
      and(eq(operationCards.clinicId, patients.clinicId), eq(operationCards.patientId, patients.id)),
    );

export type SummaryRow = Awaited<ReturnType<typeof selectSummaries>>[number];

const newestThreads = 200;

/** Waiting on us first, then the newest; at most 200. */
export const summariesVisibleTo = (tx: Tx, actor: PersonActor): Promise<SummaryRow[]> =>
  selectSummaries(tx, actor)
    .where(visibleThreads(tx, actor))
    .orderBy(sql`${threads.state} = 'waiting-on-us' desc`, desc(threads.lastAt))
    .limit(newestThreads);

export const summaryOf = async (tx: Tx, actor: PersonActor, threadId: string): Promise<SummaryRow> => {
  const rows = await selectSummaries(tx, actor).where(
    and(visibleThreads(tx, actor), eq(threads.id, threadId)),
  );
  const row = rows[0];
  if (!row) throw new Problem('not-found');
  return row;
};

/** In the threads of the record that somebody acts on. */
export const countUnseenMessages = async (tx: Tx, actor: PersonActor): Promise<number> => {
  const rows = await tx
    .select({ total: sql<number>`coalesce(sum(${unseenBy(actor)}), 0)::int` })
    .from(threads)
    .where(and(eq(threads.clinicId, actor.clinicId), ownThreads(actor)));
  return rows[0]?.total ?? 0;
};

export const participantsOf = (tx: Tx, clinicId: string, threadId: string) =>
  tx
    .select({
      personId: threadParticipants.personId,
      name: people.name,
      side: threadParticipants.side,
      seenSequence: threadParticipants.seenSequence,
      seenAt: threadParticipants.seenAt,
    })
    .from(threadParticipants)
    .innerJoin(
      people,
      and(eq(people.clinicId, threadParticipants.clinicId), eq(people.id, threadParticipants.personId)),
    )
    .where(and(eq(threadParticipants.clinicId, clinicId), eq(threadParticipants.threadId, threadId)))
    .orderBy(asc(people.name));

const messageColumns = {
  id: messages.id,
  clientId: messages.clientId,
  threadId: messages.threadId,
  sequence: messages.sequence,
  kind: messages.kind,
  authorId: messages.authorId,
  authorName: people.name,
  authorSide: messages.authorSide,
  text: messages.text,
  sentAt: messages.sentAt,
  relationship: sql<string | null>`case when ${messages.authorSide} = 'patient' then ${relationshipTo(
    threads.clinicId,
    threads.patientId,
    messages.authorId,
  )} end`,
};

const selectMessages = (tx: Tx) =>
  tx
    .select(messageColumns)
    .from(messages)
    .innerJoin(threads, and(eq(threads.clinicId, messages.clinicId), eq(threads.id, messages.threadId)))
    .leftJoin(people, and(eq(people.clinicId, messages.clinicId), eq(people.id, messages.authorId)));

export type MessageRow = Awaited<ReturnType<typeof selectMessages>>[number];

const messagePageSize = 200;

export const messagesAfter = (tx: Tx, thread: ThreadRow, after: number): Promise<MessageRow[]> =>
  selectMessages(tx)
    .where(
      and(
        eq(messages.clinicId, thread.clinicId),
        eq(messages.threadId, thread.id),
        gt(messages.sequence, after),
      ),
    )
    .orderBy(asc(messages.sequence))
    .limit(messagePageSize);

export const messageByClientId = async (
  tx: Tx,
  { clinicId, authorId, clientId }: { clinicId: string; authorId: string; clientId: string },
): Promise<MessageRow | null> => {
  const rows = await selectMessages(tx).where(
    and(eq(messages.clinicId, clinicId), eq(messages.authorId, authorId), eq(messages.clientId, clientId)),
  );
  return rows[0] ?? null;
};
