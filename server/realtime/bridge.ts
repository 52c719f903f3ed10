import type { Logger } from 'pino';
import { listenTo } from '../db/listener.ts';
import { hintChannel, type Announcement } from './announce.ts';

/** Hears what transactions announced, and says so when something may have been missed. */
export const listenForHints = (
  databaseUrl: string,
  handlers: { onAnnouncement: (announcement: Announcement) => void; onGap: () => void },
  log: Logger,
): { ready: Promise<void>; stop: () => Promise<void> } =>
  listenTo(
    { databaseUrl, channel: hintChannel, name: 'espalier-hints' },
    {
      onPayload: (payload) => handlers.onAnnouncement(JSON.parse(payload) as Announcement),
      onGap: handlers.onGap,
    },
    log,
  );
