import { spawn } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { ensureInstalled } from './install.mjs';
import { root } from './places.mjs';
import { main, Stop } from './say.mjs';
import { joinTestCluster } from './test-cluster.mjs';

/** Runs every benchmark of tests/bench, one after the other, against the test cluster. */
await main(async () => {
  await ensureInstalled();
  const { superUrl, leave } = await joinTestCluster();
  try {
    for (const file of readdirSync(join(root, 'tests/bench')).sort()) {
      const child = spawn(join(root, 'node_modules/.bin/tsx'), [join('tests/bench', file)], {
        cwd: root,
        env: { ...process.env, TEST_SUPER_URL: superUrl },
        stdio: ['ignore', 'inherit', 'inherit'],
      });
      const code = await new Promise((resolve) => child.once('close', resolve));
      if (code !== 0) throw new Stop(`${file} failed (${code}).`);
    }
  } finally {
    await leave();
  }
});
