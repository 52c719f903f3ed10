import type { Pools } from '#server/db/pools.ts';
import { withTx } from '#server/db/with-tx.ts';
import { evaluateCheckIn } from '#server/features/check-ins/evaluation.ts';
import type { JobPayload } from '#server/jobs/queues.ts';

/** Evaluates a check-in; quiet when a web's sweep was faster. */
export const evaluateCheckInTask = async (
  { app }: Pools,
  { clinicId, checkInId }: JobPayload<'evaluate-check-in'>,
  now: Date,
): Promise<void> => {
  const actor = { kind: 'system', clinicId } as const;
  await withTx(app, actor, (tx) => evaluateCheckIn(tx, actor, checkInId, now));
};
