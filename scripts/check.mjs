import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { ensureInstalled } from './install.mjs';
import { root } from './places.mjs';
import { main, say, Stop } from './say.mjs';
import { runStep } from './steps.mjs';

const tool = (name, ...args) => runStep(join(root, 'node_modules/.bin', name), args);
const script = (name) => runStep(process.execPath, [join(root, 'scripts', name)]);

/** An address in the lock would tie every install to the registry that one machine used. */
function lockWithoutAddresses() {
  const found = readFileSync(join(root, 'package-lock.json'), 'utf8').match(/"resolved":/g) ?? [];
  if (found.length > 0)
    throw new Stop(`package-lock.json holds ${found.length} "resolved" entries; .npmrc omits them.`);
}

const CHECKS = [
  ['types', () => tool('tsc', '--noEmit')],
  ['lint', () => tool('eslint', '.')],
  ['format', () => tool('prettier', '--check', '.')],
  [
    'import boundaries',
    () =>
      tool('depcruise', '--config', '.dependency-cruiser.cjs', 'src', 'server', 'shared', 'workers', 'tests'),
  ],
  ['unused code', () => tool('knip')],
  ['OpenAPI drift', () => tool('tsx', 'server/http/openapi-cli.ts', '--check')],
  ['migrations', () => tool('drizzle-kit', 'check')],
  ['migration drift', () => script('migration-drift.mjs')],
  ['lock', lockWithoutAddresses],
  ['build', () => script('build.mjs')],
  ['bundle budget', () => script('budget.mjs').then(say)],
];

await main(async () => {
  await ensureInstalled({ postgres: false });
  const failed = [];
  for (const [name, check] of CHECKS) {
    const begun = Date.now();
    try {
      await check();
      say(`ok      ${name} (${((Date.now() - begun) / 1000).toFixed(1)} s)`);
    } catch (error) {
      failed.push(name);
      say(`FAILED  ${name}\n${error instanceof Stop ? error.message : error.stack}\n`);
    }
  }
  say(failed.length === 0 ? '\nAll checks passed.' : `\nFailed: ${failed.join(', ')}.`);
  if (failed.length > 0) process.exitCode = 1;
});
