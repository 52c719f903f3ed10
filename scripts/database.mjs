import { startCluster } from './cluster.mjs';
import { lastLines } from './logs.mjs';
import { secrets } from './secrets.mjs';
import { runStep } from './steps.mjs';

/** The addresses on the server of DATABASE_URL, whose role may make the others. */
export function givenDatabase() {
  const made = secrets();
  const as = (username, password) =>
    Object.assign(new URL(process.env.DATABASE_URL), { username, password }).href;
  return {
    ownerUrl: process.env.DATABASE_URL,
    appUrl: as('espalier_app', made.appPassword),
    gateUrl: as('espalier_gate', made.gatePassword),
  };
}

/** The cluster of this checkout as a part of a run. */
export async function startDatabase() {
  const { stop, ...cluster } = await startCluster();
  return {
    ...cluster,
    name: 'database',
    lastWords: () => lastLines(cluster.log),
    stop: (how = 'orderly') => stop(how === 'orderly' ? 'fast' : 'immediate'),
  };
}

/** Brings the database up to date as its owner, before anything serves. */
export async function migrate(program, ownerUrl, signal) {
  const made = secrets();
  await runStep(process.execPath, program, {
    env: {
      ...process.env,
      OWNER_DATABASE_URL: ownerUrl,
      APP_DATABASE_PASSWORD: made.appPassword,
      GATE_DATABASE_PASSWORD: made.gatePassword,
    },
    signal,
  });
}
