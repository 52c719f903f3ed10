import {
  closeThread,
  getThread,
  listMessages,
  listThreads,
  markSeen,
  postMessage,
  postThread,
} from '#shared/threads/contract.ts';
import { route } from '../../http/route.ts';
import { addMessage, endThread, listThreadsFor, openThread, readMessages, seeThread } from './service.ts';
import { startThread } from './starting.ts';

export const threadRoutes = [
  route(listThreads, {
    access: { permission: 'thread:read' },
    audit: 'threads.listed',
    handler: async ({ tx, actor, now }) => ({ threads: await listThreadsFor(tx, actor, now) }),
  }),
  route(postThread, {
    access: { permission: 'thread:write' },
    audit: 'thread.message-posted',
    handler: ({ body, tx, actor, now }) => startThread(tx, actor, body, now),
  }),
  route(getThread, {
    access: { permission: 'thread:read' },
    audit: 'thread.opened',
    handler: ({ params, tx, actor, now }) => openThread(tx, actor, params.threadId, now),
  }),
  route(listMessages, {
    access: { permission: 'thread:read' },
    audit: { none: 'Catching up on a thread whose opening is on record.' },
    handler: ({ params, query, tx, actor }) => readMessages(tx, actor, params.threadId, query.after),
  }),
  route(postMessage, {
    access: { permission: 'thread:write' },
    audit: 'thread.message-posted',
    handler: ({ params, body, tx, actor, now }) => addMessage(tx, actor, { ...params, ...body }, now),
  }),
  route(markSeen, {
    access: { permission: 'thread:read' },
    audit: 'thread.seen',
    handler: ({ params, body, tx, actor, now }) => seeThread(tx, actor, { ...params, ...body }, now),
  }),
  route(closeThread, {
    access: { permission: 'thread:close' },
    audit: 'thread.closed',
    handler: ({ params, tx, actor, now }) => endThread(tx, actor, params.threadId, now),
  }),
];
