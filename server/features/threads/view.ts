import type { Message, ThreadDetail, ThreadSummary } from '#shared/threads/contract.ts';
import { dayPostOp, localDateIn } from '#shared/plans/calendar.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { participantsOf, summaryOf, type MessageRow, type SummaryRow } from './queries.ts';

const authorOf = ({ authorId, authorName, authorSide, relationship }: MessageRow): Message['author'] => {
  if (!authorId || !authorName || !authorSide) return null;
  const author = { personId: authorId, name: authorName, side: authorSide };
  return relationship ? { ...author, relationship } : author;
};

export const toMessage = ({ sentAt, ...row }: MessageRow): Message => ({
  id: row.id,
  clientId: row.clientId,
  threadId: row.threadId,
  sequence: row.sequence,
  kind: row.kind,
  text: row.text,
  author: authorOf({ sentAt, ...row }),
  sentAt: sentAt.toISOString(),
});

export const toSummary = (row: SummaryRow, now: Date): ThreadSummary => ({
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

export const detailOf = async (
  tx: Tx,
  actor: PersonActor,
  threadId: string,
  now: Date,
): Promise<ThreadDetail> => {
  const summary = toSummary(await summaryOf(tx, actor, threadId), now);
  const participants = await participantsOf(tx, actor.clinicId, threadId);
  return {
    ...summary,
    participants: participants.map((one) => ({ ...one, seenAt: one.seenAt?.toISOString() ?? null })),
  };
};
