import { sql } from 'drizzle-orm';
import type pg from 'pg';
import { credentials } from '../../db/schema/gate.ts';
import { withTx } from '../../db/with-tx.ts';

/**
 * A transaction of the gate in which nobody else changes this person's ways in: two removals at once would
 * each find the other's still there, and together leave none.
 */
export const withWaysInLocked = <T>(
  gate: pg.Pool,
  personId: string,
  run: (gate: pg.PoolClient) => Promise<T>,
): Promise<T> =>
  withTx(gate, { kind: 'anonymous' }, async (tx) => {
    await tx.execute(
      sql`select 1 from ${credentials} where ${credentials.personId} = ${personId} for update`,
    );
    return run(tx.$client);
  });
