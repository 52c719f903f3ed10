import pg from 'pg';
import type { Logger } from 'pino';
import { hintChannel, type Announcement } from './announce.ts';

const longestPauseMs = 5_000;

/**
 * Hears what transactions announced, on a connection of its own. When that connection breaks it opens
 * another and says so, because what was announced in between was missed.
 */
export const listenForHints = (
  databaseUrl: string,
  handlers: { onAnnouncement: (announcement: Announcement) => void; onGap: () => void },
  log: Logger,
): { ready: Promise<void>; stop: () => Promise<void> } => {
  let stopped = false;
  let client: pg.Client | null = null;
  let wake: (() => void) | null = null;

  const connectOnce = async (): Promise<pg.Client> => {
    const next = new pg.Client({
      connectionString: databaseUrl,
      application_name: 'espalier-hints',
      keepAlive: true,
    });
    // A connection that breaks may report it more than once; an error that nobody hears ends the process.
    next.on('error', (error) => {
      if (!stopped) log.warn({ err: error }, 'the hint connection broke');
    });
    next.on('notification', ({ payload }) => {
      if (payload) handlers.onAnnouncement(JSON.parse(payload) as Announcement);
    });
    await next.connect();
    await next.query(`listen ${hintChannel}`);
    return next;
  };

  const run = async (isFirst: boolean, onReady: () => void): Promise<void> => {
    let pauseMs = 100;
    let first = isFirst;
    while (!stopped) {
      try {
        const current = await connectOnce();
        if (stopped) {
          await current.end();
          return;
        }
        client = current;
        pauseMs = 100;
        if (first) onReady();
        else handlers.onGap();
        first = false;
        await new Promise<void>((resolve) => current.once('end', () => resolve()));
        client = null;
      } catch (error) {
        log.warn({ err: error }, 'the hint connection could not be opened');
      }
      if (stopped) return;
      await new Promise<void>((resolve) => {
        const timer = setTimeout(resolve, pauseMs);
        wake = () => {
          clearTimeout(timer);
          resolve();
        };
      });
      pauseMs = Math.min(pauseMs * 2, longestPauseMs);
    }
  };

  let running: Promise<void> = Promise.resolve();
  const ready = new Promise<void>((resolve) => {
    running = run(true, resolve);
  });
  return {
    ready,
    stop: async () => {
      stopped = true;
      wake?.();
      await client?.end();
      await running;
    },
  };
};
