import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import PgBoss from 'pg-boss';
import { queueOptions, queueSchema, type JobName } from '../jobs/queues.ts';
import { appRole, ensureRoles } from './roles.ts';

/** Any number that nothing else locks; two processes that migrate together wait for each other. */
const migrationLock = 4_600_001;

const makeQueues = async (ownerUrl: string): Promise<void> => {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: queueSchema,
    supervise: false,
    schedule: false,
  });
  boss.on('error', (error) => {
    throw error;
  });
  await boss.start();
  for (const name of Object.keys(queueOptions) as JobName[]) {
    const options = { name, retryBackoff: true, ...queueOptions[name] };
    if (await boss.getQueue(name)) await boss.updateQueue(name, options);
    else await boss.createQueue(name, options);
  }
  await boss.stop({ graceful: false, wait: true });
};

/** Brings a database up to date as its owner: roles, tables, fence, queues. Safe to run again. */
export const migrateDatabase = async (
  ownerUrl: string,
  passwords: { app: string; gate: string },
  migrationsFolder: string,
): Promise<void> => {
  const client = new pg.Client({ connectionString: ownerUrl, options: '-c timezone=UTC' });
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [migrationLock]);
    await ensureRoles(client, passwords);
    await migrate(drizzle({ client, casing: 'snake_case' }), { migrationsFolder });
    await makeQueues(ownerUrl);
    await client.query(`grant usage on schema ${queueSchema} to ${appRole}`);
    await client.query(
      `grant select, insert, update, delete on all tables in schema ${queueSchema} to ${appRole}`,
    );
  } finally {
    await client.end();
  }
};
