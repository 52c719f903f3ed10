import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { endLeftovers } from './cluster-leftovers.mjs';
import { clusterFolder, clusterUrls, startCluster } from './cluster.mjs';
import { lock, processBirth, stillRuns } from './lock.mjs';
import { localFolder } from './places.mjs';
import { postgresFolder, runProgram } from './postgres-programs.mjs';
import { say } from './say.mjs';

const NAME = 'test-cluster';

function users() {
  const folder = localFolder(`${NAME}-users`);
  for (const file of readdirSync(folder)) {
    const user = JSON.parse(readFileSync(join(folder, file), 'utf8'));
    if (!stillRuns(user)) rmSync(join(folder, file));
  }
  return readdirSync(folder);
}

/** Without fsync a reboot may have torn the files, and nothing in them is worth keeping. */
function dropWhenRebooted(folder) {
  const boot = readFileSync('/proc/sys/kernel/random/boot_id', 'utf8');
  const path = join(folder, 'boot');
  if (existsSync(path) && readFileSync(path, 'utf8') !== boot)
    rmSync(join(folder, 'data'), { recursive: true });
  writeFileSync(path, boot);
}

/** A test run that was killed leaves the databases behind that it had cloned. */
async function dropClones(superUrl) {
  await runProgram(
    join(postgresFolder(), 'psql'),
    ['-X', '-q', '-v', 'ON_ERROR_STOP=1', '-f', '-', superUrl],
    {
      input: "select 'drop database ' || datname from pg_database where datname like 'test\\_%' \\gexec",
    },
  );
}

/**
 * Takes part in the test cluster of this checkout: the first user starts it, the last one ends it,
 * so that several test runs at once share one server. It is unsafe against power loss and so for tests only.
 */
export async function joinTestCluster() {
  const lockFile = join(localFolder(), `${NAME}.lock`);
  const own = join(localFolder(`${NAME}-users`), `${process.pid}.json`);
  const whileWaiting = (pid) => say(`Waiting for the test database of another run (${pid}) …`);
  const release = await lock(lockFile, whileWaiting);
  try {
    const folder = clusterFolder(NAME);
    if (users().length === 0) {
      dropWhenRebooted(folder);
      const cluster = await startCluster({ name: NAME, unsafe: true });
      cluster.letGo();
      await dropClones(cluster.superUrl);
    }
    writeFileSync(own, JSON.stringify({ pid: process.pid, birth: processBirth(process.pid) }));
    const leave = async () => {
      const releaseAgain = await lock(lockFile, whileWaiting);
      try {
        rmSync(own, { force: true });
        if (users().length === 0) await endLeftovers(join(folder, 'data'));
      } finally {
        releaseAgain();
      }
    };
    return { superUrl: clusterUrls(NAME).superUrl, leave };
  } finally {
    release();
  }
}
