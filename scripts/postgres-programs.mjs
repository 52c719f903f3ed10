import { spawn, spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync, readdirSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { Stop } from './say.mjs';
import { runStep } from './steps.mjs';

const DEBIAN_FOLDER = '/usr/lib/postgresql';

function runnable(path) {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** The folder with PostgreSQL's server programs: the newest, or that of one major version; null when there is none. */
export function postgresFolder(major = null) {
  const versions = existsSync(DEBIAN_FOLDER)
    ? readdirSync(DEBIAN_FOLDER).filter((name) => /^\d+$/.test(name))
    : [];
  const folders = versions
    .sort((a, b) => Number(b) - Number(a))
    .filter((version) => major === null || version === major)
    .map((version) => join(DEBIAN_FOLDER, version, 'bin'));
  if (major === null)
    folders.push(...(process.env.PATH ?? '').split(delimiter).filter((folder) => folder !== ''));
  return (
    folders.find((folder) => ['initdb', 'postgres', 'psql'].every((name) => runnable(join(folder, name)))) ??
    null
  );
}

/** The account that runs PostgreSQL: root may not, so Debian's own account does; null means the present user. */
export function postgresAccount() {
  if (process.getuid() !== 0) return null;
  const id = (flag) => Number(spawnSync('id', [flag, 'postgres'], { encoding: 'utf8' }).stdout.trim() || NaN);
  const account = { uid: id('-u'), gid: id('-g') };
  if (Number.isNaN(account.uid))
    throw new Stop("PostgreSQL may not run as root and the 'postgres' account is missing.");
  return account;
}

/** From `/`, which every account may enter, and without the PG… settings of the person's own shell. */
function surroundings(account, env) {
  return { cwd: '/', env: { PATH: process.env.PATH, LC_ALL: 'C.UTF-8', ...env }, ...account };
}

/** Runs one of the programs to its end, returns what it printed, and throws with what it said when it fails. */
export function runProgram(program, args, { account = null, input, env = {} } = {}) {
  return runStep(program, args, { ...surroundings(account, env), input });
}

/** Starts the server in a session of its own: the terminal's Ctrl-C does not reach it. */
export function launchServer(program, args, account, logDescriptor) {
  return spawn(program, args, {
    ...surroundings(account, {}),
    detached: true,
    stdio: ['ignore', logDescriptor, logDescriptor],
  });
}

/** Whether the account can reach a folder through all of its parents. */
export function canEnter(folder, account) {
  return spawnSync('test', ['-x', folder], surroundings(account, {})).status === 0;
}
