/**
 * A hint says that something changed, never what: ids and numbers only, so that it may pass through a
 * NOTIFY payload and a socket. The truth is fetched from the API, which checks rights again.
 */
export type Hint =
  | { topic: 'flags'; flagId: string }
  | { topic: 'thread'; threadId: string; sequence: number }
  | { topic: 'alert'; alertId: string }
  | { topic: 'today' }
  /** One's own roles, care or settings changed: ask who one is. */
  | { topic: 'session' }
  /** The server may have missed hints: fetch everything on the screen again. */
  | { topic: 'everything' };

/** The one socket event that carries hints, and the one that says that the session is over. */
export const hintEvent = 'hint';
export const sessionEndedEvent = 'session-ended';
