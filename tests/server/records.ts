import { randomUUID } from 'node:crypto';
import { drizzle } from 'drizzle-orm/node-postgres';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { Urgency } from '#shared/red-flags/findings.ts';
import type { FlagState } from '#shared/triage/lifecycle.ts';
import { alerts, checkIns } from '#server/db/schema/check-ins.ts';
import { findings, flagEvents, flags } from '#server/db/schema/flags.ts';
import { messages, threadParticipants, threads } from '#server/db/schema/threads.ts';
import type { TestPatient, TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';

const db = ({ asSuperuser }: TestDatabase) => drizzle({ client: asSuperuser, casing: 'snake_case' });

type Planted = { id: string; clientId: string };

/** A check-in as if it had been sent, and by default evaluated, at an instant. */
export const plantCheckIn = async (
  database: TestDatabase,
  { clinicId, patientId, personId }: TestPatient,
  options: {
    at?: Date;
    answers?: Answers;
    clientId?: string;
    evaluated?: boolean;
    kind?: 'daily' | 'something-new';
  } = {},
): Promise<Planted> => {
  const at = options.at ?? new Date();
  const planted = { id: randomUUID(), clientId: options.clientId ?? randomUUID() };
  await db(database)
    .insert(checkIns)
    .values({
      ...planted,
      clinicId,
      patientId,
      authorId: personId,
      kind: options.kind ?? 'daily',
      answers: options.answers ?? { painNow: 2, painWorst: 3 },
      answeredAt: at,
      receivedAt: at,
      localDate: at.toISOString().slice(0, 10),
      rulesVersion: 'shipped-1',
      evaluatedAt: options.evaluated === false ? null : at,
    });
  return planted;
};

/** An alert as if it had been sent at the tick, evaluated by default. */
export const plantAlert = async (
  database: TestDatabase,
  { clinicId, patientId, personId }: TestPatient,
  options: { answers?: Answers; clientId?: string; checkInClientId?: string; evaluated?: boolean } = {},
): Promise<Planted> => {
  const at = new Date();
  const planted = { id: randomUUID(), clientId: options.clientId ?? randomUUID() };
  await db(database)
    .insert(alerts)
    .values({
      ...planted,
      clinicId,
      patientId,
      authorId: personId,
      checkInClientId: options.checkInClientId ?? randomUUID(),
      answers: options.answers ?? { danger: ['bleeding'] },
      answeredAt: at,
      receivedAt: at,
      localDate: at.toISOString().slice(0, 10),
      rulesVersion: 'shipped-1',
      evaluatedAt: options.evaluated === false ? null : at,
    });
  return planted;
};

/** A flag with its check-in, one finding and the event that raised it; claimed where somebody is named. */
export const plantFlag = async (
  database: TestDatabase,
  patient: TestPatient,
  options: {
    urgency?: Urgency;
    state?: FlagState;
    claimedBy?: TestPerson;
    raisedAt?: Date;
    checkInClientId?: string;
    answers?: Answers;
  } = {},
): Promise<{ flagId: string; checkInClientId: string }> => {
  const { clinicId, patientId, personId } = patient;
  const raisedAt = options.raisedAt ?? new Date();
  const flagId = randomUUID();
  const urgency = options.urgency ?? 'same-day';
  const state = options.state ?? (options.claimedBy ? 'claimed' : 'open');
  const { clientId: checkInClientId } = await plantCheckIn(database, patient, {
    at: raisedAt,
    answers: options.answers ?? { painNow: 3, symptoms: ['fall'] },
    ...(options.checkInClientId ? { clientId: options.checkInClientId } : {}),
  });
  await db(database)
    .insert(flags)
    .values({
      clinicId,
      id: flagId,
      patientId,
      sourceAuthorId: personId,
      sourceClientId: checkInClientId,
      urgency,
      state,
      raisedAt,
      claimedBy: options.claimedBy?.personId ?? null,
      claimedAt: options.claimedBy ? raisedAt : null,
      ...(state === 'closed' ? { closedAt: raisedAt, outcome: 'advised-by-phone' as const } : {}),
    });
  await db(database)
    .insert(findings)
    .values({
      clinicId,
      flagId,
      sourceId: randomUUID(),
      code: 'fall',
      ruleVersion: 1,
      urgency,
      values: { day: 24, painNow: 3, usual: null, onArm: false, hitHead: false },
      toldAt: raisedAt,
    });
  await db(database)
    .insert(flagEvents)
    .values({ clinicId, flagId, kind: 'raised', at: raisedAt, detail: urgency });
  return { flagId, checkInClientId };
};

/** A patient's thread with its messages, all of them the patient's own. */
export const plantThread = async (
  database: TestDatabase,
  { clinicId, patientId, personId }: TestPatient,
  options: { texts?: string[]; clientId?: string } = {},
): Promise<{ threadId: string }> => {
  const threadId = randomUUID();
  const at = new Date();
  const texts = options.texts ?? ['May I take the sling off to wash?'];
  await db(database)
    .insert(threads)
    .values({
      clinicId,
      id: threadId,
      patientId,
      authorId: personId,
      clientId: options.clientId ?? randomUUID(),
      subject: 'Washing',
      state: 'waiting-on-us',
      lastSequence: texts.length,
      lastAt: at,
      createdAt: at,
    });
  await db(database)
    .insert(threadParticipants)
    .values({ clinicId, threadId, personId, side: 'patient', seenSequence: texts.length, seenAt: at });
  await db(database)
    .insert(messages)
    .values(
      texts.map((text, index) => ({
        clinicId,
        threadId,
        sequence: index + 1,
        kind: 'message' as const,
        authorId: personId,
        authorSide: 'patient' as const,
        clientId: randomUUID(),
        text,
        sentAt: at,
      })),
    );
  return { threadId };
};

/** As a worker leaves what it has sent: what comes after that is told by a word of its own. */
export const markTold = async ({ asSuperuser }: TestDatabase): Promise<void> => {
  await asSuperuser.query(`update notifications set state = 'sent', sent_at = now() where state = 'pending'`);
};
