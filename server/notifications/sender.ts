import type { Logger } from 'pino';
import { withTx } from '../db/with-tx.ts';
import { dueNotifications } from './claiming.ts';
import { deliver, type DeliveryTools } from './delivery.ts';

/** So many are on their way at once, from one worker. */
const atOnceByDefault = 8;

/**
 * Sends what is due, a few at once. Each lane takes the most urgent that is due whenever it is free, so an emergency
 * waits for one try at most, however many lesser ones are queued. A lane that found something opens another.
 */
export const createSender = (
  tools: DeliveryTools,
  { clock, log, atOnce = atOnceByDefault }: { clock: () => Date; log: Logger; atOnce?: number },
) => {
  const lanes = new Set<Promise<void>>();
  /** What the lanes of this worker are at; between workers the claim decides. */
  const underWay = new Set<string>();
  let stopping = false;

  /** False when nothing is due that others are not already at. */
  const sendNext = async (): Promise<boolean> => {
    const due = await withTx(tools.pools.app, { kind: 'anonymous' }, (tx) =>
      // The other lanes and workers reach for the same ones: enough that one is left.
      dueNotifications(tx, clock(), atOnce * 2),
    );
    for (const one of due) {
      if (stopping) return false;
      if (underWay.has(one.id)) continue;
      underWay.add(one.id);
      try {
        if (await deliver(tools, one, clock, wake)) return true;
      } catch (error) {
        // One that cannot even be taken up stays first in line, and must not keep what stands behind it waiting.
        log.error({ err: error, notificationId: one.id }, 'a notification could not be taken up');
      } finally {
        underWay.delete(one.id);
      }
    }
    return false;
  };

  const run = async (): Promise<void> => {
    try {
      let found = true;
      while (found && !stopping) found = await sendNext();
    } catch (error) {
      // The next wake-up begins anew; what was claimed is free again when its lease has run out.
      log.error({ err: error }, 'sending what is due failed');
    }
  };

  const wake = (): void => {
    if (stopping || lanes.size >= atOnce) return;
    const lane = run().finally(() => lanes.delete(lane));
    lanes.add(lane);
  };

  const idle = async (): Promise<void> => {
    while (lanes.size > 0) await Promise.all(lanes);
  };

  return {
    /** Something may be due. */
    wake,
    /** Resolves when nothing is on its way any more. */
    idle,
    /** Takes nothing more and lets what is on its way arrive. */
    stop: async (): Promise<void> => {
      stopping = true;
      await idle();
    },
  };
};

export type Sender = ReturnType<typeof createSender>;
