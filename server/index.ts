import { createServer } from 'node:http';
import { createApp } from './app.ts';
import { assertSafeServer, closePools, openPools } from './db/pools.ts';
import { readWebEnv } from './env.ts';
import { startSweep } from './features/check-ins/sweep.ts';
import { createLog } from './log.ts';
import { endWithParent } from './process/parent.ts';
import { listenForHints } from './realtime/bridge.ts';
import { openSockets } from './realtime/sockets.ts';

// First of all, so that a start whose parent is gone ends too.
endWithParent();

const env = readWebEnv(process.env);
const log = createLog('web', env.LOG_LEVEL);
const clock = () => new Date();

const pools = openPools({ app: env.APP_DATABASE_URL, gate: env.GATE_DATABASE_URL }, log);
await assertSafeServer(pools);

const { app, identity } = createApp({
  pools,
  clock,
  log,
  publicUrl: env.PUBLIC_URL,
  trustProxy: env.TRUST_PROXY,
  sessionSecret: env.SESSION_SECRET,
  tokenSecret: env.TOKEN_SECRET,
  sealSecret: env.SEAL_SECRET,
  vapidPublicKey: env.VAPID_PUBLIC_KEY,
  buildId: env.BUILD_ID,
  clientDir: env.CLIENT_DIR,
  outboxUrl: env.OUTBOX_URL,
  hookTokens: { telephone: env.TWILIO_AUTH_TOKEN, mailBounces: env.MAIL_BOUNCE_TOKEN },
  demoAuthenticators: env.DEMO_AUTHENTICATORS,
});
const server = createServer(app);
const sockets = openSockets(server, { pools, clock, publicUrl: env.PUBLIC_URL, identity, log });
const hints = listenForHints(
  env.APP_DATABASE_URL,
  { onAnnouncement: sockets.deliver, onGap: sockets.deliverGap },
  log,
);
await hints.ready;
const sweep = startSweep(pools.app, clock, log);

server.listen(env.PORT, env.HOST, () => {
  log.info({ address: server.address() }, 'web ready');
});

let ending = false;

/** Takes no new request, lets those under way finish, then lets go of the database. */
const drain = async (): Promise<void> => {
  if (ending) return;
  ending = true;
  log.info('web is draining');
  await sockets.close();
  await sweep.stop();
  await hints.stop();
  await closePools(pools);
  log.info('web ended');
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
