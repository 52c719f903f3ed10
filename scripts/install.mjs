import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { appendFileSync, existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { lock } from './lock.mjs';
import { root } from './places.mjs';
import { postgresFolder } from './postgres-programs.mjs';
import { say, Stop } from './say.mjs';
import { runStep } from './steps.mjs';

const LOWEST_NODE = [20, 20];
const CHROMIUM = '/usr/bin/chromium';
const CREATE_CLUSTER_CONF = '/etc/postgresql-common/createcluster.conf';
const LOCK_HASH = join(root, 'node_modules/.espalier-lock-hash');

function requireNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major > LOWEST_NODE[0] || (major === LOWEST_NODE[0] && minor >= LOWEST_NODE[1])) return;
  throw new Stop(`Espalier needs Node ${LOWEST_NODE.join('.')} or newer; this is ${process.versions.node}.`);
}

async function installPackages(signal) {
  const hash = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex');
  if (existsSync(LOCK_HASH) && readFileSync(LOCK_HASH, 'utf8') === hash) return;
  say('Installing packages …');
  // npm may keep dot files when it empties the folder; an interrupted install must not look finished.
  rmSync(LOCK_HASH, { force: true });
  await runStep('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { signal });
  writeFileSync(LOCK_HASH, hash);
}

/** Refuses when this account cannot install, with the one command that helps. */
function requireApt(what, packageName) {
  const hasApt = spawnSync('apt-get', ['--version']).status === 0;
  if (hasApt && process.getuid() === 0) return;
  throw new Stop(
    hasApt
      ? `${what} is missing; install it as root: apt-get update && apt-get install -y ${packageName}`
      : `${what} is missing; install it with the packages of your system.`,
  );
}

/** Installs from apt. It is not interrupted: half an install leaves the machine's package system broken. */
async function aptInstall(...packages) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', NEEDRESTART_MODE: 'a' };
  const waitForOthers = ['-o', 'DPkg::Lock::Timeout=300'];
  await runStep('apt-get', [...waitForOthers, 'install', '-y', '--no-install-recommends', ...packages], {
    env,
  });
}

async function installPostgres(signal) {
  if (postgresFolder() !== null) return;
  requireApt('PostgreSQL', 'postgresql');
  say('Installing PostgreSQL …');
  await runStep('apt-get', ['update'], { signal });
  await aptInstall('postgresql-common');
  // Debian would make and start a cluster of its own on port 5432; ours lives in the checkout.
  const conf = existsSync(CREATE_CLUSTER_CONF) ? readFileSync(CREATE_CLUSTER_CONF, 'utf8') : '';
  if (!/^\s*create_main_cluster\s*=\s*false/m.test(conf)) {
    appendFileSync(CREATE_CLUSTER_CONF, '\ncreate_main_cluster = false\n');
  }
  await aptInstall('postgresql');
  if (postgresFolder() === null)
    throw new Stop("PostgreSQL's server programs were not found after installing it.");
}

async function installChromium(signal) {
  if (existsSync(CHROMIUM)) return;
  requireApt('Chromium (for the browser tests)', 'chromium');
  say('Installing Chromium …');
  await runStep('apt-get', ['update'], { signal });
  await aptInstall('chromium');
  if (!existsSync(CHROMIUM)) throw new Stop(`Chromium was not found at ${CHROMIUM} after installing it.`);
}

/**
 * The one install step before start, dev, test and check: packages, PostgreSQL, and for tests a browser.
 * A second run in the same checkout waits for the first, then finds everything there.
 */
export async function ensureInstalled({ postgres = true, chromium = false, signal } = {}) {
  requireNode();
  const whileWaiting = (pid) => say(`Waiting for another install (${pid}) …`);
  const release = await lock(join(root, '.local/install.lock'), whileWaiting, signal);
  try {
    await installPackages(signal);
    if (postgres && process.env.DATABASE_URL === undefined) await installPostgres(signal);
    if (chromium) await installChromium(signal);
  } finally {
    release();
  }
}
