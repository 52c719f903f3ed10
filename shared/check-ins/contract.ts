import { z } from 'zod';
import { contract } from '../http/contract.ts';
import { answersSchema } from './answers.ts';

const localDate = z.iso.date();

/** What both a finished check-in and an alert at the tick carry. */
const answered = {
  answers: answersSchema,
  /** The device's clock when the person answered, and when it sent this. */
  answeredAt: z.iso.datetime(),
  sentAt: z.iso.datetime(),
  rulesVersion: z.string().max(40),
};

export const checkInKinds = ['daily', 'something-new'] as const;

export const postCheckInBody = z.strictObject({
  /** Made by the client; a repeat with the same id and answers is the same check-in. */
  id: z.uuid(),
  kind: z.enum(checkInKinds),
  ...answered,
});
export type PostCheckIn = z.output<typeof postCheckInBody>;

export const checkInReceipt = z.object({
  id: z.uuid(),
  receivedAt: z.iso.datetime(),
  localDate,
  /** The device's clock and the server's disagreed by over five minutes, so the server's date was taken. */
  clockDoubtful: z.boolean(),
});
export type CheckInReceipt = z.output<typeof checkInReceipt>;

export const postCheckIn = contract({
  method: 'post',
  path: '/api/check-ins',
  summary: 'Send a finished check-in, or something new at any hour.',
  status: 201,
  body: postCheckInBody,
  output: checkInReceipt,
});

export const postAlertBody = z.strictObject({
  id: z.uuid(),
  /** The check-in that is being filled in; when it is finished it joins the alert's flag. */
  checkInId: z.uuid(),
  ...answered,
});
export type PostAlert = z.output<typeof postAlertBody>;

const alertParams = z.object({ alertId: z.uuid() });

export const alertReceipt = z.object({
  id: z.uuid(),
  checkInId: z.uuid(),
  receivedAt: z.iso.datetime(),
  /** The first clinician who had it on the screen. Never inferred, only recorded. */
  seen: z.object({ by: z.string(), at: z.iso.datetime() }).nullable(),
});
export type AlertReceipt = z.output<typeof alertReceipt>;

export const postAlert = contract({
  method: 'post',
  path: '/api/alerts',
  summary: 'An emergency or urgent answer, sent at the tick.',
  status: 201,
  body: postAlertBody,
  output: alertReceipt,
});

export const getAlert = contract({
  method: 'get',
  path: '/api/alerts/:alertId',
  summary: 'What the clinic has done about an alert: received, seen by whom and when.',
  status: 200,
  params: alertParams,
  output: alertReceipt,
});

export const postMistakeBody = z.strictObject({ id: z.uuid(), answeredAt: z.iso.datetime() });

export const postMistake = contract({
  method: 'post',
  path: '/api/alerts/:alertId/mistakes',
  summary: 'The person says that the tick was a mistake. A new record; the flag stays for a human.',
  status: 201,
  params: alertParams,
  body: postMistakeBody,
  output: z.object({ id: z.uuid(), receivedAt: z.iso.datetime() }),
});

/** What the phone needs so that its rules give the same answer as the server's. */
export const getCheckInContext = contract({
  method: 'get',
  path: '/api/check-in-context',
  summary:
    'What the rules read besides the answers: earlier check-ins, operation card, precautions in force.',
  status: 200,
  output: z.object({
    day: z.number().int(),
    date: localDate,
    timeZone: z.string(),
    lastCheckInDate: localDate.nullable(),
    usual: z.object({ painNow: z.number().nullable(), painWorst: z.number().nullable() }),
    history: z.array(
      z.object({
        answeredAt: z.iso.datetime(),
        painNow: z.number().nullable(),
        painWorst: z.number().nullable(),
        byProxy: z.boolean(),
      }),
    ),
    operationCard: z.object({
      arm: z.enum(['left', 'right']),
      procedure: z.string(),
      block: z.enum(['none', 'single', 'long-acting']),
    }),
    /** Null where nobody has recorded it: the rules count unknown as taking one. */
    safetyFacts: z.object({ bloodThinner: z.boolean().nullable() }),
    precautionsInForce: z.array(z.string()),
  }),
});
export type CheckInContext = z.output<NonNullable<(typeof getCheckInContext)['output']>>;
