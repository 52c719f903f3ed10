import type { Logger } from 'pino';
import type { DeliveryTools } from '#server/notifications/delivery.ts';
import { remindEverywhere } from '#server/notifications/reminders.ts';
import type { Sender } from '#server/notifications/sender.ts';

/** How soon a row is noticed whose pause or whose quiet hours are over. */
const lookEveryMs = 1_000;
const remindEveryMs = 60_000;

/** What comes due by the clock alone. Any number of workers may do it: the rows decide what is done once. */
export const startTimedWork = (
  { pools }: DeliveryTools,
  { sender, clock, log }: { sender: Sender; clock: () => Date; log: Logger },
): { stop: () => Promise<void> } => {
  let reminding: Promise<void> | null = null;
  const look = setInterval(sender.wake, lookEveryMs);
  const remind = setInterval(() => {
    reminding ??= remindEverywhere(pools.app, clock(), log)
      .catch((error: unknown) => log.error({ err: error }, 'nobody could be reminded'))
      .finally(() => {
        reminding = null;
      });
  }, remindEveryMs);
  return {
    stop: async () => {
      clearInterval(look);
      clearInterval(remind);
      await reminding;
    },
  };
};
