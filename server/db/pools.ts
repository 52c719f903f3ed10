import pg from 'pg';
import type { Logger } from 'pino';

/** The two pools of a process: the clinics' rows behind their fence, and the gate's few tables outside it. */
export type Pools = { app: pg.Pool; gate: pg.Pool };

const statementMs = 5_000;
const lockMs = 2_000;
const idleInTransactionMs = 10_000;

const openPool = (connectionString: string, max: number, name: string, log: Logger): pg.Pool => {
  const pool = new pg.Pool({
    connectionString,
    max,
    application_name: name,
    connectionTimeoutMillis: 5_000,
    options: `-c timezone=UTC -c statement_timeout=${statementMs} -c lock_timeout=${lockMs} -c idle_in_transaction_session_timeout=${idleInTransactionMs}`,
  });
  // An idle connection that breaks must not end the process; the next query opens another.
  pool.on('error', (error) => log.warn({ err: error, pool: name }, 'an idle database connection broke'));
  return pool;
};

export const openPools = (urls: { app: string; gate: string }, log: Logger): Pools => ({
  app: openPool(urls.app, 10, 'espalier-app', log),
  gate: openPool(urls.gate, 5, 'espalier-gate', log),
});

export const closePools = async (pools: Pools): Promise<void> => {
  await Promise.all([pools.app.end(), pools.gate.end()]);
};

/**
 * Refuses a server that may answer before a write is durable, and a role that could pass row security: by a
 * right of its own, or as an owner who may take it away.
 */
export const assertSafeServer = async (pools: Pools): Promise<void> => {
  const { rows } = await pools.app.query<{ commit: string; bypass: boolean }>(
    `select current_setting('synchronous_commit') as commit, rolsuper or rolbypassrls
       or exists (select from pg_tables where schemaname = 'public' and pg_has_role(tableowner, 'member')) as bypass
     from pg_roles where rolname = current_user`,
  );
  const found = rows[0];
  if (!found || found.commit === 'off') {
    throw new Error('The database answers before a write is durable: set synchronous_commit to on.');
  }
  if (found.bypass)
    throw new Error('APP_DATABASE_URL names a role that passes row security. Use espalier_app.');
};
