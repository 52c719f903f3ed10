import { sql } from 'drizzle-orm';
import type pg from 'pg';
import type { Logger } from 'pino';
import type { SystemActor } from '../../db/actor.ts';
import { withTx } from '../../db/with-tx.ts';
import { evaluateAlert, evaluateCheckIn } from './evaluation.ts';

/** What no worker has evaluated for this long is evaluated by any web. */
const sweepAfterMs = 10_000;
const sweepEveryMs = 2_000;

type Waiting = { clinic_id: string; kind: 'check-in' | 'alert'; id: string };

/** One round: finds what is waiting in any clinic, by ids, and evaluates each inside its own clinic. */
export const sweepUnevaluated = async (app: pg.Pool, now: Date, log: Logger): Promise<number> => {
  const before = new Date(now.getTime() - sweepAfterMs);
  const { rows } = await withTx(app, { kind: 'anonymous' }, (tx) =>
    tx.execute<Waiting>(sql`select clinic_id, kind, id from unevaluated_before(${before})`),
  );
  let evaluated = 0;
  for (const { clinic_id: clinicId, kind, id } of rows) {
    const actor: SystemActor = { kind: 'system', clinicId };
    const evaluateOne = kind === 'alert' ? evaluateAlert : evaluateCheckIn;
    try {
      const done = await withTx(app, actor, (tx) => evaluateOne(tx, actor, id, now));
      if (done === 'evaluated') evaluated += 1;
    } catch (error) {
      // One that cannot be evaluated must not keep the others waiting; the next round tries it again.
      log.error({ err: error, clinicId, kind, id }, 'the sweep could not evaluate');
    }
  }
  return evaluated;
};

/** Sweeps for as long as the web lives. */
export const startSweep = (app: pg.Pool, clock: () => Date, log: Logger): { stop: () => Promise<void> } => {
  let running: Promise<unknown> | null = null;
  const timer = setInterval(() => {
    running ??= sweepUnevaluated(app, clock(), log)
      .then((evaluated) => {
        if (evaluated > 0) log.warn({ evaluated }, 'the sweep evaluated what no worker did');
      })
      .catch((error: unknown) => log.error({ err: error }, 'the sweep failed'))
      .finally(() => {
        running = null;
      });
  }, sweepEveryMs);
  return {
    stop: async () => {
      clearInterval(timer);
      await running;
    },
  };
};
