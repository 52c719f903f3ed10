import { sql } from 'drizzle-orm';
import PgBoss from 'pg-boss';
import type { Tx } from '../db/with-tx.ts';
import { jobChannel, queueSchema, type JobName, type JobPayload } from './queues.ts';

/** Never started: it only writes jobs through the transaction that it is handed. */
const writer = new PgBoss({
  schema: queueSchema,
  db: {
    executeSql: () => Promise.reject(new Error('A job is written inside a transaction, through enqueue().')),
  },
});

/**
 * Adds a job to the caller's transaction: it exists if and only if the transaction commits. With a key, a
 * second job under the same key is not added while the first is waiting. Higher priorities are taken first.
 */
export const enqueue = async <Name extends JobName>(
  tx: Tx,
  name: Name,
  payload: JobPayload<Name>,
  { key, priority }: { key?: string; priority?: number } = {},
): Promise<void> => {
  await writer.send(name, payload, {
    ...(key === undefined ? {} : { singletonKey: key }),
    ...(priority === undefined ? {} : { priority }),
    db: { executeSql: (text, values) => tx.$client.query(text, values) },
  });
  await tx.execute(sql`select pg_notify(${jobChannel}, ${name})`);
};
