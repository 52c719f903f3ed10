import { isOpenAt, nextOpening } from '#shared/clinic/hours.ts';
import type { ThreadState } from '#shared/threads/contract.ts';
import type { messages, threadParticipants, threads } from '../db/schema/threads.ts';
import { demoClinic, demoClinicId } from './clinic.ts';
import { idOf } from './random.ts';
import { staffId, type StaffKey } from './staff.ts';

type MessageRow = typeof messages.$inferSelect;
type ParticipantRow = typeof threadParticipants.$inferSelect;

export type DemoThread = {
  thread: typeof threads.$inferSelect;
  messages: MessageRow[];
  participants: ParticipantRow[];
};

export type Line = { from: 'patient' | StaffKey; at: Date; text: string };

export type Conversation = {
  id: string;
  patientId: string;
  patientPersonId: string;
  subject: string;
  /** The flag that a clinician answered with this thread. */
  flagId: string | null;
  lines: readonly Line[];
  isClosed: boolean;
  /** When the last message was seen by the other side; null while it has not been. */
  lastSeen: { by: 'patient' | StaffKey; at: Date } | null;
};

const noteEveryMs = 12 * 60 * 60 * 1000;

/** How every note of a closed clinic begins. */
export const closedClinicWords = 'The clinic is closed and opens ';

/** What a thread says by itself when somebody writes to the closed clinic; the words are the product's own. */
export const closedClinicNote = (
  { openingHours, timeZone, ...clinic }: typeof demoClinic,
  at: Date,
): string => {
  const opensAt = nextOpening(openingHours, timeZone, at);
  const opens = opensAt
    ? new Intl.DateTimeFormat('en-US', {
        timeZone,
        weekday: 'long',
        hour: '2-digit',
        minute: '2-digit',
        hourCycle: 'h23',
      }).format(opensAt)
    : 'the next working day';
  return (
    `${closedClinicWords}${opens}. This thread is not watched until then. ` +
    `If it cannot wait, call ${clinic.onCallNumber}; in an emergency call ${clinic.emergencyNumber}.`
  );
};

const stateOf = ({ isClosed, lines }: Conversation): ThreadState => {
  if (isClosed) return 'closed';
  return lines.at(-1)?.from === 'patient' ? 'waiting-on-us' : 'waiting-on-patient';
};

/** The rows of a conversation, as they stand after each message went through the product. */
export const threadOf = (conversation: Conversation): DemoThread => {
  const { id, patientId, patientPersonId, subject, flagId, lines, lastSeen } = conversation;
  const [first] = lines;
  if (!first) throw new Error(`The thread "${subject}" has no message.`);
  const personOf = (who: Line['from']): string => (who === 'patient' ? patientPersonId : staffId(who));
  const written: MessageRow[] = [];
  const seen = new Map<string, ParticipantRow>();
  const sees = (who: Line['from'], seenSequence: number, seenAt: Date | null): void => {
    const side = who === 'patient' ? 'patient' : 'clinic';
    const personId = personOf(who);
    seen.set(personId, { clinicId: demoClinicId, threadId: id, personId, side, seenSequence, seenAt });
  };
  const row = (index: string, sentAt: Date, text: string) => ({
    clinicId: demoClinicId,
    id: idOf('message', id, index),
    threadId: id,
    sequence: written.length + 1,
    text,
    sentAt,
  });

  sees('patient', 0, null);
  let lastNoteAt = 0;
  lines.forEach(({ from, at, text }, index) => {
    const side = from === 'patient' ? 'patient' : 'clinic';
    const isReply = index === 0 && flagId !== null;
    written.push({
      ...row(String(index), at, text),
      ...(isReply ? { id: idOf('reply', flagId) } : {}),
      kind: 'message',
      authorId: personOf(from),
      authorSide: side,
      clientId: idOf('message-of-device', id, index),
    });
    const isUnwatched = !isOpenAt(demoClinic.openingHours, demoClinic.timeZone, at);
    if (side === 'patient' && isUnwatched && at.getTime() - lastNoteAt > noteEveryMs) {
      const note = row(`note-${index}`, at, closedClinicNote(demoClinic, at));
      written.push({ ...note, kind: 'note', authorId: null, authorSide: null, clientId: null });
      lastNoteAt = at.getTime();
    }
    sees(from, written.length, at);
  });
  if (lastSeen) sees(lastSeen.by, written.length, lastSeen.at);

  return {
    thread: {
      clinicId: demoClinicId,
      id,
      patientId,
      authorId: personOf(first.from),
      clientId: flagId ?? idOf('thread-of-device', id),
      subject,
      state: stateOf(conversation),
      flagId,
      lastSequence: written.length,
      lastAt: lines.at(-1)?.at ?? first.at,
      createdAt: first.at,
    },
    messages: written,
    participants: [...seen.values()],
  };
};
