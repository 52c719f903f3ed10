import { z } from 'zod';
import { contract } from '../http/contract.ts';
import { urgencies } from '../red-flags/findings.ts';
import { messageText } from '../threads/message-text.ts';
import { flagStates, outcomeNeeds, outcomes } from './lifecycle.ts';

const flagParams = z.object({ flagId: z.uuid() });

const personName = z.object({ personId: z.uuid(), name: z.string() });

export const flagRow = z.object({
  id: z.uuid(),
  state: z.enum(flagStates),
  urgency: z.enum(urgencies),
  patient: z.object({
    id: z.uuid(),
    name: z.string(),
    day: z.number().int(),
    arm: z.enum(['left', 'right']),
    procedure: z.string(),
  }),
  /** The reason of the highest urgency in a few words, the rest counted. */
  headline: z.string(),
  raisedAt: z.iso.datetime(),
  claimedBy: personName.nullable(),
  claimedAt: z.iso.datetime().nullable(),
  /** When the patient said last that a tick behind this flag was a mistake. It stays for a human all the same. */
  calledMistakeAt: z.iso.datetime().nullable(),
  /** Pain now of the last 14 days, oldest first; null for a day without a check-in. */
  pain14: z.array(z.number().nullable()),
  usualPain: z.number().nullable(),
});
export type FlagRow = z.output<typeof flagRow>;

export const reason = z.object({
  code: z.string(),
  ruleVersion: z.number().int(),
  urgency: z.enum(urgencies),
  title: z.string(),
  sentence: z.string(),
  source: z.string(),
});
export type Reason = z.output<typeof reason>;

export const flagEvent = z.object({
  id: z.uuid(),
  kind: z.enum([
    'raised',
    'raised-again',
    'seen',
    'claimed',
    'released',
    'replied',
    'ticked-by-mistake',
    'closed',
  ]),
  at: z.iso.datetime(),
  by: z.string().nullable(),
  detail: z.string().nullable(),
  /** What a person wrote about it. */
  note: z.string().nullable(),
});

export const flagCase = flagRow.extend({
  reasons: z.array(reason),
  person: z.object({
    age: z.number().int(),
    phone: z.string(),
    surgeon: z.string(),
    phase: z.string(),
    emergencyContact: z.string(),
    bloodThinner: z.string().nullable(),
    allergies: z.string().nullable(),
    chartNumber: z.string(),
    language: z.string(),
  }),
  /** One row a question: what was answered, beside the person's own usual. */
  beside: z.array(
    z.object({
      label: z.string(),
      today: z.string(),
      usual: z.string().nullable(),
      /** 14 days for the questions that are numbers. */
      days14: z.array(z.number().nullable()).nullable(),
    }),
  ),
  answeredAt: z.iso.datetime(),
  /** Present where a caregiver answered for the patient. */
  answeredBy: z.object({ name: z.string(), relationship: z.string() }).optional(),
  note: z.string().nullable(),
  inForce: z.array(
    z.object({ code: z.string(), text: z.string(), usualDate: z.iso.date(), due: z.boolean() }),
  ),
  events: z.array(flagEvent),
  earlier: z.array(
    z.object({
      id: z.uuid(),
      raisedAt: z.iso.datetime(),
      urgency: z.enum(urgencies),
      headline: z.string(),
      state: z.enum(flagStates),
    }),
  ),
  threadId: z.uuid().nullable(),
  outcome: z.enum(outcomes).nullable(),
});
export type FlagCase = z.output<typeof flagCase>;

export const listFlags = contract({
  method: 'get',
  path: '/api/flags',
  summary: 'The morning round: open and claimed flags by urgency, then by age.',
  status: 200,
  output: z.object({
    date: z.iso.date(),
    flags: z.array(flagRow),
    /** Patients who checked in today with nothing flagged. */
    quiet: z.number().int(),
  }),
});
export type MorningRound = z.output<NonNullable<(typeof listFlags)['output']>>;

export const getFlag = contract({
  method: 'get',
  path: '/api/flags/:flagId',
  summary: 'The case: why it was flagged, today beside the usual, what is in force, what was done.',
  status: 200,
  params: flagParams,
  output: flagCase,
});

export const seeFlag = contract({
  method: 'post',
  path: '/api/flags/:flagId/seen',
  summary: 'This clinician has the case on the screen; the patient is told.',
  status: 204,
  params: flagParams,
});

export const claimFlag = contract({
  method: 'post',
  path: '/api/flags/:flagId/claim',
  summary: 'Take the flag. One person holds it; a second is told who.',
  status: 200,
  params: flagParams,
  output: flagRow,
});

export const releaseFlag = contract({
  method: 'post',
  path: '/api/flags/:flagId/release',
  summary: 'Give a claimed flag back to the round.',
  status: 200,
  params: flagParams,
  output: flagRow,
});

export const closeFlagBody = z
  .strictObject({
    outcome: z.enum(outcomes, 'Choose an outcome.'),
    worthRaising: z.enum(['yes', 'no'], 'Say whether it was worth raising.'),
    note: z.string().trim().max(2000, 'At most 2,000 characters.').default(''),
  })
  .superRefine(({ outcome, note }, context) => {
    const need = outcomeNeeds[outcome];
    if (need && note === '') context.addIssue({ code: 'custom', path: ['note'], message: need });
  });

export const closeFlag = contract({
  method: 'post',
  path: '/api/flags/:flagId/close',
  summary: 'Close the flag with an outcome.',
  status: 200,
  params: flagParams,
  body: closeFlagBody,
  output: flagRow,
});

export const replyBody = z.strictObject({ id: z.uuid(), text: messageText });

export const replyToFlag = contract({
  method: 'post',
  path: '/api/flags/:flagId/replies',
  summary: 'Write to the patient about this flag, in its own thread; an open flag is claimed by it.',
  status: 201,
  params: flagParams,
  body: replyBody,
  output: z.object({ threadId: z.uuid(), messageId: z.uuid(), sequence: z.number().int() }),
});
