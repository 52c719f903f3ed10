import { createHash } from 'node:crypto';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { givenDatabase, migrate, startDatabase } from './database.mjs';
import { demoAct, showAccounts } from './demo-clinic.mjs';
import { ensureInstalled } from './install.mjs';
import { answers, startPart } from './parts.mjs';
import { local, localFolder, root } from './places.mjs';
import { freePort, portIsFree } from './ports.mjs';
import { buildWhenNeeded, programs } from './programs.mjs';
import { run, takeRunLock } from './run.mjs';
import { say, Stop } from './say.mjs';
import { secrets } from './secrets.mjs';
import { builtId } from './sources.mjs';

const READY_WITHIN_MS = 60_000;

/** Where the product is to be found, from PORT, HOST and PUBLIC_URL. */
function address() {
  const port = Number(process.env.PORT ?? 4600);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Stop(`PORT must be a whole number from 1 to 65535, not "${process.env.PORT}".`);
  }
  const host = process.env.HOST ?? '127.0.0.1';
  const given = process.env.PUBLIC_URL ?? `http://localhost:${port}`;
  if (!URL.canParse(given))
    throw new Stop(`PUBLIC_URL must be an address such as http://localhost:4600, not "${given}".`);
  return { port, host, publicUrl: given.replace(/\/+$/, '') };
}

const LOOPBACK = /^(localhost|127(\.\d+){3}|\[?::1\]?)$/;

/** The demo's passwords are printed and published: it goes beyond this machine only where that was asked for. */
function requireDemoAtHome({ host, publicUrl }) {
  if (process.env.DEMO !== undefined) return;
  if (LOOPBACK.test(host) && LOOPBACK.test(new URL(publicUrl).hostname)) return;
  throw new Stop(
    'The demo has published passwords and an open outbox, and HOST or PUBLIC_URL leads beyond this machine. Set DEMO=off, or DEMO=on to show it all the same.',
  );
}

async function requireFreePort({ port, host }) {
  if (await portIsFree(port, host)) return;
  throw new Stop(
    `Port ${port} on ${host} is taken by another program. Choose another with PORT=${port + 100}.`,
  );
}

/** Tells what comes next, unless the run was asked to end in between. */
function progress(line, signal) {
  signal.throwIfAborted();
  say(line);
}

async function openDatabase(add, tell) {
  if (process.env.DATABASE_URL !== undefined) return givenDatabase();
  tell('Starting the database …');
  return add(await startDatabase());
}

/** Fills the demo clinic on the first run, or moves an older one to today, before the worker sees it. */
async function prepareDemo(program, ownerUrl, tell, signal) {
  tell('Preparing the demo clinic …');
  await demoAct(program, 'fill', ownerUrl, signal);
  return demoAct(program, 're-anchor', ownerUrl, signal);
}

/** Without the demo every gateway is real and named by the environment, which the parts are handed as it is. */
const NO_FAKES = { OUTBOX_URL: undefined, PUSH_FAKE_URL: undefined, TWILIO_API_URL: undefined };

/** Starts the fakes, and gives what makes web and worker speak to them. */
async function startFakes(args, { gatewayToken }, add, signal) {
  const smtpPort = await freePort();
  const outboxPort = await freePort();
  const account = {
    TWILIO_ACCOUNT_SID: `AC${createHash('sha256').update(gatewayToken).digest('hex').slice(0, 32)}`,
    TWILIO_AUTH_TOKEN: gatewayToken,
  };
  const folder = localFolder('fakes');
  const env = { SMTP_PORT: smtpPort, OUTBOX_PORT: outboxPort, FAKES_DIR: folder, ...account };
  add(startPart({ name: 'fakes', args, env }));
  const outboxUrl = `http://127.0.0.1:${outboxPort}`;
  await answers(outboxUrl, { signal });
  return {
    ...account,
    SMTP_URL: `smtp://127.0.0.1:${smtpPort}`,
    OUTBOX_URL: outboxUrl,
    PUSH_FAKE_URL: outboxUrl,
    TWILIO_API_URL: outboxUrl,
    TWILIO_FROM: '+12025550100',
  };
}

/** Everything from the bare checkout to the ready line, then until it is ended. Returns the exit code. */
export async function runProduct({ watched }) {
  const { port, host, publicUrl } = address();
  const demo = process.env.DEMO !== 'off';
  if (!demo && process.env.SMTP_URL === undefined) {
    throw new Stop('With DEMO=off set SMTP_URL, the address of the mail server to send through.');
  }
  requireDemoAtHome({ host, publicUrl });
  const release = await takeRunLock();
  try {
    await requireFreePort({ port, host });
    return await run(publicUrl, async ({ add, signal }) => {
      await ensureInstalled({ signal });
      const tell = (line) => progress(line, signal);
      const { ownerUrl, appUrl, gateUrl } = await openDatabase(add, tell);
      if (!watched) await buildWhenNeeded(tell, signal);
      const made = secrets();
      const use = programs(watched);
      tell('Migrating …');
      await migrate(use.migrate, ownerUrl, signal);
      const filled = demo ? await prepareDemo(use.demo, ownerUrl, tell, signal) : null;
      // What an earlier start with the demo left has published passwords.
      if (!demo) await demoAct(use.demo, 'remove', ownerUrl, signal);
      const gateways = demo ? await startFakes(use.fakes, made, add, signal) : NO_FAKES;
      const shared = {
        APP_DATABASE_URL: appUrl,
        GATE_DATABASE_URL: gateUrl,
        ...gateways,
        NODE_ENV: watched ? 'development' : 'production',
        PUBLIC_URL: publicUrl,
        TOKEN_SECRET: made.tokenSecret,
        VAPID_PUBLIC_KEY: made.vapidPublicKey,
        BUILD_ID: watched ? 'development' : builtId(),
      };
      const webPort = watched ? await freePort() : port;
      const webHost = watched ? '127.0.0.1' : host;
      add(
        startPart({
          name: 'web',
          args: use.web,
          echo: watched,
          env: {
            ...shared,
            PORT: webPort,
            HOST: webHost,
            SESSION_SECRET: made.sessionSecret,
            AUDIT_SECRET: made.auditSecret,
            SEAL_SECRET: made.sealSecret,
            ...(filled ? { DEMO_AUTHENTICATORS: JSON.stringify(filled.authenticators) } : {}),
            CLIENT_DIR: join(root, 'dist/client'),
          },
        }),
      );
      const webUrl = `http://${reachable(webHost)}:${webPort}`;
      await answers(`${webUrl}/healthz`, { signal });
      const worker = startPart({
        name: 'worker',
        args: use.worker,
        echo: watched,
        env: { ...shared, VAPID_PRIVATE_KEY: made.vapidPrivateKey },
      });
      const workerReady = worker.says('worker ready');
      add(worker);
      await Promise.race([workerReady, tooLate(worker, signal)]);
      // Only with a worker's heartbeat is the web ready.
      await answers(`${webUrl}/readyz`, { signal });
      if (watched) await startVite(add, { port, host, webUrl, signal });
      say(`\nEspalier is ready at ${publicUrl}`);
      if (filled) {
        showAccounts(filled);
        say(`\nOutbox: ${publicUrl}/outbox`);
      }
      say(`Logs: ${join(local, 'logs')}. Ctrl-C ends everything.`);
    });
  } finally {
    release();
  }
}

/** Gives up on a part that neither becomes ready nor stops; `signal` gives up at once. */
async function tooLate(part, signal) {
  await wait(READY_WITHIN_MS, undefined, { ref: false, signal });
  throw new Stop(
    `The ${part.name} did not become ready within a minute. Its last words:\n${part.lastWords()}`,
  );
}

async function startVite(add, { port, host, webUrl, signal }) {
  const args = [join(root, 'node_modules/vite/bin/vite.js'), '--clearScreen', 'false'];
  add(startPart({ name: 'vite', args, echo: true, env: { PORT: port, HOST: host, WEB_URL: webUrl } }));
  await answers(`http://${reachable(host)}:${port}/`, { signal });
}

/** An address that means "all" is listened on, but not called. */
function reachable(host) {
  if (host === '0.0.0.0' || host === '::') return '127.0.0.1';
  return host.includes(':') ? `[${host}]` : host;
}
