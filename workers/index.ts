import { assertSafeServer, closePools, openPools } from '#server/db/pools.ts';
import { readWorkerEnv } from '#server/env.ts';
import { createLog } from '#server/log.ts';
import { endWithParent } from '#server/process/parent.ts';
import { openChannels } from './channels.ts';
import { startWork } from './work.ts';

// First of all, so that a start whose parent is gone ends too.
endWithParent();

const env = readWorkerEnv(process.env);
const log = createLog('worker', env.LOG_LEVEL);
const pools = openPools({ app: env.APP_DATABASE_URL, gate: env.GATE_DATABASE_URL }, log);
await assertSafeServer(pools);
const channels = openChannels(env);
const work = await startWork({
  databaseUrl: env.APP_DATABASE_URL,
  tools: { pools, channels, tokenSecret: env.TOKEN_SECRET },
  clock: () => new Date(),
  log,
});
log.info('worker ready');

let ending = false;

/** Lets jobs under way finish; what was not started is another worker's. */
const drain = async (): Promise<void> => {
  if (ending) return;
  ending = true;
  await work.stop();
  for (const channel of Object.values(channels)) channel.close();
  await closePools(pools);
  log.info('worker ended');
};

const onSignal = () => {
  drain().then(
    () => process.exit(0),
    (error: unknown) => {
      log.error({ err: error }, 'draining failed');
      process.exit(1);
    },
  );
};
process.on('SIGTERM', onSignal);
process.on('SIGINT', onSignal);
