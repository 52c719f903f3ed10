import pg from 'pg';
import { z } from 'zod';
import { demoAccounts, demoAuthenticatorSecrets } from './accounts.ts';
import { runDemoAct } from './acts.ts';

const env = z
  .object({
    OWNER_DATABASE_URL: z.string().min(1),
    TOKEN_SECRET: z.string().min(32),
    SEAL_SECRET: z.string().min(32),
  })
  .parse(process.env);
const act = z
  .enum(['fill', 're-anchor', 'remove', 'reset'], 'Say what to do: fill, re-anchor, remove or reset.')
  .parse(process.argv[2]);

const owner = new pg.Pool({
  connectionString: env.OWNER_DATABASE_URL,
  max: 1,
  application_name: 'espalier-demo',
  options: '-c timezone=UTC',
});

try {
  await runDemoAct(owner, act, new Date(), {
    tokenSecret: env.TOKEN_SECRET,
    sealSecret: env.SEAL_SECRET,
  });
} finally {
  await owner.end();
}
process.stdout.write(
  `${JSON.stringify({ accounts: demoAccounts, authenticators: demoAuthenticatorSecrets })}\n`,
);
