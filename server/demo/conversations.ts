import type { LocalDate } from '#shared/plans/calendar.ts';
import { conversationTexts, type ConversationLine, type ConversationText } from './conversation-texts.ts';
import { clock, instantAt, minutesAfter, workingDayBefore } from './moments.ts';
import { eightWeeks } from './long-conversation.ts';
import { patientIdOf, patientsOfDemo, personIdOf } from './patients.ts';
import { idOf } from './random.ts';
import { threadOf, type Conversation, type DemoThread, type Line } from './threads.ts';

/** From her second day home to yesterday: the working days before today on which a pair was written. */
const backOf = (index: number): number => Math.round(40 - (index * 39) / (eightWeeks.length - 1));

const weekByWeek: ConversationText = {
  patient: 'Rukmini Dass',
  subject: 'Exercises, week by week',
  lines: eightWeeks.flatMap(([asked, answered], index): ConversationLine[] => [
    [backOf(index), '9:20', 'patient', asked],
    [backOf(index), index % 3 === 0 ? '12:35' : '10:05', 'callum', answered],
  ]),
  isUnread: true,
};

const conversationOf = (text: ConversationText, today: LocalDate): Conversation => {
  const { patient, subject, isClosed = false, isUnread = false } = text;
  const lead = patientsOfDemo.find(({ name }) => name === patient)?.lead;
  if (!lead) throw new Error(`The demo has a thread of ${patient}, but no such patient.`);
  const toLine = ([back, time, from, words]: ConversationLine): Line => ({
    from,
    at: instantAt(back === 0 ? today : workingDayBefore(today, back), clock(time), 11),
    text: words,
  });
  const lines = text.lines.map(toLine);
  const last = lines.at(-1);
  return {
    id: idOf('thread', patient, subject),
    patientId: patientIdOf(patient),
    patientPersonId: personIdOf(patient),
    subject,
    flagId: null,
    lines,
    isClosed,
    lastSeen:
      isUnread || !last
        ? null
        : { by: last.from === 'patient' ? lead : 'patient', at: minutesAfter(last.at, 14) },
  };
};

/** The threads that patients have opened, in every state. */
export const conversationsOn = (today: LocalDate): DemoThread[] =>
  [...conversationTexts, weekByWeek].map((text) => threadOf(conversationOf(text, today)));
