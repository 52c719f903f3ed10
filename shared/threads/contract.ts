import { z } from 'zod';
import { contract } from '../http/contract.ts';
import { messageText, subjectLine } from './message-text.ts';

const threadParams = z.object({ threadId: z.uuid() });

export const threadStates = ['waiting-on-us', 'waiting-on-patient', 'closed'] as const;
export type ThreadState = (typeof threadStates)[number];

export const message = z.object({
  id: z.uuid(),
  /** The id that the author's device gave it; null for notes of the system. */
  clientId: z.uuid().nullable(),
  threadId: z.uuid(),
  /** Position in the thread's one order, from 1, without gaps. */
  sequence: z.number().int(),
  kind: z.enum(['message', 'note']),
  author: z
    .object({
      personId: z.uuid(),
      name: z.string(),
      side: z.enum(['patient', 'clinic']),
      /** Present where a caregiver wrote for the patient: what they are to the patient. */
      relationship: z.string().optional(),
    })
    .nullable(),
  text: z.string(),
  sentAt: z.iso.datetime(),
});
export type Message = z.output<typeof message>;

export const threadSummary = z.object({
  id: z.uuid(),
  subject: z.string(),
  state: z.enum(threadStates),
  patient: z.object({ id: z.uuid(), name: z.string(), day: z.number().int() }),
  lastSequence: z.number().int(),
  lastText: z.string(),
  lastAt: z.iso.datetime(),
  /** Messages of the other side that this person has not seen. */
  unseen: z.number().int(),
  flagId: z.uuid().nullable(),
});
export type ThreadSummary = z.output<typeof threadSummary>;

export const threadDetail = threadSummary.extend({
  participants: z.array(
    z.object({
      personId: z.uuid(),
      name: z.string(),
      side: z.enum(['patient', 'clinic']),
      seenSequence: z.number().int(),
      seenAt: z.iso.datetime().nullable(),
    }),
  ),
});
export type ThreadDetail = z.output<typeof threadDetail>;

export const listThreads = contract({
  method: 'get',
  path: '/api/threads',
  summary: "A patient's own threads, or the threads a clinician answers for; those waiting on us first.",
  status: 200,
  output: z.object({ threads: z.array(threadSummary) }),
});

export const postThreadBody = z.strictObject({
  id: z.uuid(),
  subject: subjectLine,
  message: z.strictObject({ id: z.uuid(), text: messageText }),
});

export const postThread = contract({
  method: 'post',
  path: '/api/threads',
  summary: 'A patient opens a thread with its first message.',
  status: 201,
  body: postThreadBody,
  output: threadDetail,
});

export const getThread = contract({
  method: 'get',
  path: '/api/threads/:threadId',
  summary: 'One thread with who takes part and what each has seen.',
  status: 200,
  params: threadParams,
  output: threadDetail,
});

export const listMessages = contract({
  method: 'get',
  path: '/api/threads/:threadId/messages',
  summary: 'Messages in order after a sequence; at most 200 at a time.',
  status: 200,
  params: threadParams,
  query: z.object({ after: z.coerce.number().int().min(0).default(0) }),
  output: z.object({ messages: z.array(message), lastSequence: z.number().int() }),
});

export const postMessageBody = z.strictObject({ id: z.uuid(), text: messageText });

export const postMessage = contract({
  method: 'post',
  path: '/api/threads/:threadId/messages',
  summary: 'Add a message. The same id with the same text is the same success.',
  status: 201,
  params: threadParams,
  body: postMessageBody,
  output: message,
});

export const markSeen = contract({
  method: 'post',
  path: '/api/threads/:threadId/seen',
  summary: 'This person has seen the thread up to a sequence.',
  status: 200,
  params: threadParams,
  body: z.strictObject({ sequence: z.number().int().min(1) }),
  output: z.object({ seenSequence: z.number().int(), seenAt: z.iso.datetime() }),
});

export const closeThread = contract({
  method: 'post',
  path: '/api/threads/:threadId/close',
  summary: 'Close a thread. A new message opens it again.',
  status: 200,
  params: threadParams,
  output: threadSummary,
});
