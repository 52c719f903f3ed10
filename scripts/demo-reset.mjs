import { join } from 'node:path';
import { clusterUrls } from './cluster.mjs';
import { givenDatabase, migrate, startDatabase } from './database.mjs';
import { demoAct, showAccounts } from './demo-clinic.mjs';
import { ensureInstalled } from './install.mjs';
import { tryLock } from './lock.mjs';
import { localFolder } from './places.mjs';
import { buildWhenNeeded, programs } from './programs.mjs';
import { main, say } from './say.mjs';

/** Empties the demo clinic and fills it again, whether or not the product runs. No other clinic is touched. */
await main(async () => {
  await ensureInstalled();
  await buildWhenNeeded(say);
  const use = programs(false);
  const lock = tryLock(join(localFolder(), 'run.lock'));
  const given = process.env.DATABASE_URL !== undefined;
  const started = lock.release && !given ? await startDatabase() : null;
  try {
    const { ownerUrl } = started ?? (given ? givenDatabase() : clusterUrls());
    if (lock.release) await migrate(use.migrate, ownerUrl);
    const demo = await demoAct(use.demo, 'reset', ownerUrl);
    say('The demo clinic is as on its first day.');
    showAccounts(demo);
  } finally {
    await started?.stop();
    lock.release?.();
  }
});
