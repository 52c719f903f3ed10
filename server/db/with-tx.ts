import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import type { Pool, PoolClient } from 'pg';
import type { ActingAs } from './actor.ts';

/** A transaction with an actor set. Nothing else in the server holds a connection of the application's pool. */
export type Tx = NodePgDatabase & { $client: PoolClient };

/**
 * The one way to the database: begin, say who acts, run, commit; roll back on any error. The client goes back
 * to the pool whatever happens, also when BEGIN itself fails, and is destroyed when its state is in doubt.
 */
export const withTx = async <T>(pool: Pool, actor: ActingAs, run: (tx: Tx) => Promise<T>): Promise<T> => {
  const client = await pool.connect();
  let inDoubt: Error | undefined;
  const onClientError = (error: Error) => {
    inDoubt = error;
  };
  client.on('error', onClientError);
  try {
    await client.query('begin');
    await client.query(
      `select set_config('app.clinic_id', $1, true), set_config('app.actor_kind', $2, true), set_config('app.person_id', $3, true)`,
      [
        actor.kind === 'anonymous' ? '' : actor.clinicId,
        actor.kind,
        actor.kind === 'person' ? actor.personId : '',
      ],
    );
    const result = await run(drizzle({ client, casing: 'snake_case' }));
    // A statement that failed and was caught leaves nothing to commit, and the database says so without an error.
    const { command } = await client.query('commit');
    if (command !== 'COMMIT') throw new Error('The database rolled back what was to be committed.');
    return result;
  } catch (error) {
    try {
      await client.query('rollback');
    } catch (rollbackError) {
      inDoubt = rollbackError instanceof Error ? rollbackError : new Error('Rolling back failed.');
    }
    throw error;
  } finally {
    client.off('error', onClientError);
    client.release(inDoubt);
  }
};
