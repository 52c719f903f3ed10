import type { QueryClient } from '@tanstack/react-query';
import { hintEvent, sessionEndedEvent } from '#shared/realtime/hints.ts';
import type { Hint } from '#shared/realtime/hints.ts';
import { queryPrefixes } from './query-prefixes.ts';

const retryAfterMs = 5_000;

type PrefixName = keyof typeof queryPrefixes;

/** What may look different after a hint of a topic. The session is no topic: it has its own event. */
const touchedBy: Record<Hint['topic'], readonly PrefixName[]> = {
  flags: ['flags', 'today'],
  thread: ['threads', 'today', 'flags'],
  alert: ['alerts', 'today', 'flags'],
  session: ['session'],
  today: ['today', 'plan', 'checkInContext'],
  everything: [
    'today',
    'plan',
    'checkInContext',
    'alerts',
    'flags',
    'threads',
    'worker',
    'patients',
    'people',
    'twoPersonActs',
    'deliveries',
  ],
};

/**
 * Connect, reconnect and hint are one case: what is on the screen is fetched again. One round is in flight at
 * a time; what arrives meanwhile is gathered into the next round, so a burst of hints costs two fetches.
 */
export function createCatchUp(refetch: (prefix: PrefixName) => Promise<unknown>): (hint: Hint) => void {
  const waiting = new Set<PrefixName>();
  let running = false;
  async function run() {
    running = true;
    while (waiting.size > 0) {
      const round = [...waiting];
      waiting.clear();
      // A failed fetch is told by the screen that shows it; the next hint or focus asks again.
      await Promise.allSettled(round.map(refetch));
    }
    running = false;
  }
  return ({ topic }) => {
    touchedBy[topic].forEach((prefix) => waiting.add(prefix));
    if (!running) void run();
  };
}

/**
 * Listens to the server's hints until the returned function is called. The socket library is loaded on demand,
 * since no first screen waits for it; while there is no socket, a return to the tab still asks again.
 */
export function connectHints(queryClient: QueryClient, onSessionEnded: () => void): () => void {
  const catchUp = createCatchUp((prefix) =>
    queryClient.invalidateQueries({ queryKey: queryPrefixes[prefix] }),
  );
  let stopped = false;
  let disconnect = () => {};
  let retryTimer: ReturnType<typeof setTimeout> | undefined;
  async function connect() {
    const { io } = await import('socket.io-client');
    if (stopped) return;
    const socket = io({ transports: ['websocket', 'polling'] });
    socket.on('connect', () => catchUp({ topic: 'everything' }));
    socket.on(hintEvent, catchUp);
    socket.on(sessionEndedEvent, onSessionEnded);
    // The library does not try again by itself when the server closed or refused the socket.
    const reconnectLater = () => {
      if (socket.active || stopped) return;
      clearTimeout(retryTimer);
      retryTimer = setTimeout(() => socket.connect(), retryAfterMs);
    };
    socket.on('disconnect', reconnectLater);
    socket.on('connect_error', reconnectLater);
    disconnect = () => socket.disconnect();
  }
  function attempt() {
    connect().catch(() => {
      // The library itself could not be loaded, as happens off line: it is asked for again.
      if (!stopped) retryTimer = setTimeout(attempt, retryAfterMs);
    });
  }
  attempt();
  return () => {
    stopped = true;
    clearTimeout(retryTimer);
    disconnect();
  };
}
