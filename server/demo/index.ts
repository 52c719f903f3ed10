import pg from 'pg';
import { z } from 'zod';
import { demoAccounts } from './accounts.ts';
import { runDemoAct } from './acts.ts';

const env = z.object({ OWNER_DATABASE_URL: z.string().min(1) }).parse(process.env);
const act = z
  .enum(['fill', 're-anchor', 'reset'], 'Say what to do: fill, re-anchor or reset.')
  .parse(process.argv[2]);

const owner = new pg.Pool({
  connectionString: env.OWNER_DATABASE_URL,
  max: 1,
  application_name: 'espalier-demo',
  options: '-c timezone=UTC',
});

try {
  await runDemoAct(owner, act, new Date());
} finally {
  await owner.end();
}
process.stdout.write(`${JSON.stringify({ accounts: demoAccounts })}\n`);
