import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { startCluster } from './cluster.mjs';
import { ensureInstalled } from './install.mjs';
import { lastLines } from './logs.mjs';
import { answers, startPart } from './parts.mjs';
import { local, localFolder, root } from './places.mjs';
import { freePort, portIsFree } from './ports.mjs';
import { run, takeRunLock } from './run.mjs';
import { say, Stop } from './say.mjs';
import { secrets } from './secrets.mjs';
import { builtId, sourcesId } from './sources.mjs';
import { runStep } from './steps.mjs';

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

/** The database of DATABASE_URL, whose role may make the others, or else the cluster of this checkout. */
async function openDatabase(add, signal) {
  if (process.env.DATABASE_URL === undefined) {
    progress('Starting the database …', signal);
    const { stop, ...cluster } = await startCluster();
    add({
      ...cluster,
      name: 'database',
      lastWords: () => lastLines(cluster.log),
      stop: (how = 'orderly') => stop(how === 'orderly' ? 'fast' : 'immediate'),
    });
    return cluster;
  }
  const made = secrets();
  const as = (role, password) =>
    Object.assign(new URL(process.env.DATABASE_URL), { username: role, password }).href;
  return {
    ownerUrl: process.env.DATABASE_URL,
    appUrl: as('espalier_app', made.appPassword),
    gateUrl: as('espalier_gate', made.gatePassword),
  };
}

/** How each program of the product is run: from the build, or from the sources with hot reload. */
function programs(watched) {
  const tsx = join(root, 'node_modules/tsx/dist/cli.mjs');
  const built = (name) => ['--enable-source-maps', join(root, 'dist/server', `${name}.js`)];
  const once = (source) => [tsx, source];
  const watch = (source) => [tsx, 'watch', '--clear-screen=false', source];
  if (!watched) {
    return {
      migrate: built('migrate'),
      demo: built('demo'),
      fakes: built('fakes'),
      web: built('web'),
      worker: built('worker'),
    };
  }
  return {
    migrate: once('server/db/migrate.ts'),
    demo: once('server/demo/index.ts'),
    fakes: once('server/fakes/index.ts'),
    web: watch('server/index.ts'),
    worker: watch('workers/index.ts'),
  };
}

async function buildWhenNeeded(signal) {
  if (builtId() === sourcesId()) return;
  progress('Building …', signal);
  await runStep(process.execPath, [join(root, 'scripts/build.mjs')], { signal });
}

/** Fills the demo clinic on the first run, moves an older one to today, and returns its accounts. */
async function prepareDemo(program, databaseEnv, signal) {
  progress('Preparing the demo clinic …', signal);
  const options = { env: { ...process.env, ...databaseEnv }, signal };
  const answer = await runStep(process.execPath, [...program, 'fill'], options);
  await runStep(process.execPath, [...program, 're-anchor'], options);
  return JSON.parse(answer.trimEnd().split('\n').at(-1)).accounts;
}

async function startFakes(args, add, signal) {
  const smtpPort = await freePort();
  const outboxPort = await freePort();
  const env = { SMTP_PORT: smtpPort, OUTBOX_PORT: outboxPort, FAKES_DIR: localFolder('fakes') };
  add(startPart({ name: 'fakes', args, env }));
  const outboxUrl = `http://127.0.0.1:${outboxPort}`;
  await answers(outboxUrl, { signal });
  return { SMTP_URL: `smtp://127.0.0.1:${smtpPort}`, OUTBOX_URL: outboxUrl };
}

function showAccounts(accounts) {
  const rows = accounts.map(({ who, role, email, password }) => [who, role, email, password]);
  const widths = [0, 1, 2].map((column) => Math.max(...rows.map((row) => row[column].length)));
  say('\nDemo accounts: name, role, e-mail, password (all people are invented)');
  for (const row of rows) say(`  ${row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`);
}

/** Everything from the bare checkout to the ready line, then until it is ended. Returns the exit code. */
export async function runProduct({ watched }) {
  const { port, host, publicUrl } = address();
  const demo = process.env.DEMO !== 'off';
  if (!demo && process.env.SMTP_URL === undefined) {
    throw new Stop('With DEMO=off set SMTP_URL, the address of the mail server to send through.');
  }
  const release = await takeRunLock();
  try {
    await requireFreePort({ port, host });
    return await run(publicUrl, async ({ add, signal }) => {
      await ensureInstalled({ signal });
      const { ownerUrl, appUrl, gateUrl } = await openDatabase(add, signal);
      if (!watched) await buildWhenNeeded(signal);
      const made = secrets();
      const use = programs(watched);
      const database = { APP_DATABASE_URL: appUrl, GATE_DATABASE_URL: gateUrl };
      progress('Migrating …', signal);
      await runStep(process.execPath, use.migrate, {
        env: {
          ...process.env,
          OWNER_DATABASE_URL: ownerUrl,
          APP_DATABASE_PASSWORD: made.appPassword,
          GATE_DATABASE_PASSWORD: made.gatePassword,
        },
        signal,
      });
      const accounts = demo ? await prepareDemo(use.demo, database, signal) : [];
      const mail = demo ? await startFakes(use.fakes, add, signal) : { SMTP_URL: process.env.SMTP_URL };
      const shared = {
        ...database,
        ...mail,
        NODE_ENV: watched ? 'development' : 'production',
        PUBLIC_URL: publicUrl,
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
            CLIENT_DIR: join(root, 'dist/client'),
          },
        }),
      );
      const webUrl = `http://${reachable(webHost)}:${webPort}`;
      await answers(`${webUrl}/healthz`, { signal });
      const worker = startPart({ name: 'worker', args: use.worker, echo: watched, env: shared });
      const workerReady = worker.says('worker ready');
      add(worker);
      await Promise.race([workerReady, tooLate(worker)]);
      // Only with a worker's heartbeat is the web ready.
      await answers(`${webUrl}/readyz`, { signal });
      if (watched) await startVite(add, { port, host, webUrl, signal });
      say(`\nEspalier is ready at ${publicUrl}`);
      if (demo) {
        showAccounts(accounts);
        say(`\nOutbox: ${publicUrl}/outbox`);
      }
      say(`Logs: ${join(local, 'logs')}. Ctrl-C ends everything.`);
    });
  } finally {
    release();
  }
}

/** Gives up on a part that neither becomes ready nor stops. */
async function tooLate(part) {
  await wait(READY_WITHIN_MS, undefined, { ref: false });
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
