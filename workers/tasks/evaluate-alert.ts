import type { Pools } from '#server/db/pools.ts';
import { withTx } from '#server/db/with-tx.ts';
import { evaluateAlert } from '#server/features/check-ins/evaluation.ts';
import type { JobPayload } from '#server/jobs/queues.ts';

/** Evaluates an alert sent at the tick; quiet when a web's sweep was faster. */
export const evaluateAlertTask = async (
  { app }: Pools,
  { clinicId, alertId }: JobPayload<'evaluate-alert'>,
  now: Date,
): Promise<void> => {
  const actor = { kind: 'system', clinicId } as const;
  await withTx(app, actor, (tx) => evaluateAlert(tx, actor, alertId, now));
};
