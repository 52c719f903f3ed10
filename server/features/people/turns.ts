import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/with-tx.ts';

/**
 * Until this transaction ends, nobody else of the clinic does what has this name: what was looked at is still so
 * when it is changed.
 */
export const holdTurn = async (
  tx: Tx,
  clinicId: string,
  name: 'people-change' | 'address-is-taken',
): Promise<void> => {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${name}:${clinicId}`}, 0))`);
};
