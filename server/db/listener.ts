import pg from 'pg';
import type { Logger } from 'pino';

const longestPauseMs = 5_000;

/**
 * Hears what transactions notify on a channel, on a connection of its own. When that connection breaks it opens
 * another and says so by `onGap`, because what was said in between was missed.
 */
export const listenTo = (
  { databaseUrl, channel, name }: { databaseUrl: string; channel: string; name: string },
  handlers: { onPayload: (payload: string) => void; onGap: () => void },
  log: Logger,
): { ready: Promise<void>; stop: () => Promise<void> } => {
  let stopped = false;
  let client: pg.Client | null = null;
  let wake: (() => void) | null = null;

  const connectOnce = async (): Promise<pg.Client> => {
    const next = new pg.Client({ connectionString: databaseUrl, application_name: name, keepAlive: true });
    // A connection that breaks may report it more than once; an error that nobody hears ends the process.
    next.on('error', (error) => {
      if (!stopped) log.warn({ err: error, connection: name }, 'a listening connection broke');
    });
    next.on('notification', ({ payload }) => {
      if (payload) handlers.onPayload(payload);
    });
    await next.connect();
    await next.query(`listen ${channel}`);
    return next;
  };

  const run = async (onReady: () => void): Promise<void> => {
    let pauseMs = 100;
    let first = true;
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
        log.warn({ err: error, connection: name }, 'a listening connection could not be opened');
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
    running = run(resolve);
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
