import { join } from 'node:path';
import { lock } from '../../scripts/lock.mjs';
import { localFolder } from '../../scripts/places.mjs';
import { joinTestCluster } from '../../scripts/test-cluster.mjs';
import { prepareTemplate } from './database.ts';

/**
 * Before the integration tests: takes part in the test cluster, which `npm test` may have started already,
 * tells the test files its address and has the template database made once.
 */
export async function setup(): Promise<() => Promise<void>> {
  const { superUrl, leave } = await joinTestCluster();
  try {
    process.env.TEST_SUPER_URL = superUrl;
    const release = await lock(join(localFolder(), 'template.lock'), () => undefined);
    try {
      await prepareTemplate(superUrl);
    } finally {
      release();
    }
  } catch (error) {
    await leave();
    throw error;
  }
  return leave;
}
