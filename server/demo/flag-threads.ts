import { localDateIn } from '#shared/plans/calendar.ts';
import type { FlagRecord } from '../features/triage/queries.ts';
import { demoTimeZone } from './clinic.ts';
import { instantAt, minutesAfter } from './moments.ts';
import { idOf, randomFor } from './random.ts';
import type { PatientRecord } from './records.ts';
import type { Handling } from './scenario.ts';
import { threadOf, type DemoThread, type Line } from './threads.ts';

/** The subject that the product gives to a thread about a flag. */
export const flagSubject = (raisedAt: Date): string => {
  const date = new Date(`${localDateIn(demoTimeZone, raisedAt)}T12:00:00Z`);
  const words = new Intl.DateTimeFormat('en-US', { day: 'numeric', month: 'long', timeZone: 'UTC' });
  return `Your check-in on ${words.format(date)}`;
};

const thanks = [
  'Thank you, that helps.',
  'Will do. Thank you for getting back so quickly.',
  'Understood, I will let you know.',
] as const;

/** The thread in which a clinician answered a flag; those of closed flags have been read, some answered. */
export const flagThreadOf = (
  { chart }: PatientRecord,
  flag: FlagRecord,
  { by, reply, closed }: Handling,
  date: string,
): DemoThread | null => {
  if (!reply) return null;
  const random = randomFor('flag-thread', flag.id);
  const repliedAt = instantAt(date, reply.at, 20);
  const readAt = minutesAfter(repliedAt, random.int(6, 50));
  const answers: Line[] =
    closed && random.chance(0.5)
      ? [{ from: 'patient', at: minutesAfter(readAt, 2), text: random.pick(thanks) }]
      : [];
  return threadOf({
    id: idOf('flag-thread', flag.id),
    patientId: chart.patient.id,
    patientPersonId: chart.patient.personId,
    subject: flagSubject(flag.raisedAt),
    flagId: flag.id,
    lines: [{ from: by, at: repliedAt, text: reply.text }, ...answers],
    isClosed: closed !== undefined,
    lastSeen: closed
      ? answers.length > 0
        ? { by, at: minutesAfter(readAt, 9) }
        : { by: 'patient', at: readAt }
      : null,
  });
};
