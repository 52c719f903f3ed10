import { join } from 'node:path';
import { root } from './places.mjs';
import { builtId, sourcesId } from './sources.mjs';
import { runStep } from './steps.mjs';

/** How each program of the product is run: from the build, or from the sources with hot reload. */
export function programs(watched) {
  const tsx = join(root, 'node_modules/tsx/dist/cli.mjs');
  const built = (name) => ['--enable-source-maps', join(root, 'dist/server', `${name}.js`)];
  const once = (source) => [tsx, source];
  const watch = (source) => [tsx, 'watch', '--clear-screen=false', source];
  return {
    migrate: watched ? once('server/db/migrate.ts') : built('migrate'),
    demo: watched ? once('server/demo/index.ts') : built('demo'),
    fakes: watched ? once('server/fakes/index.ts') : built('fakes'),
    web: watched ? watch('server/index.ts') : built('web'),
    worker: watched ? watch('workers/index.ts') : built('worker'),
  };
}

/** Builds what `programs` runs, unless the last build was of the same sources. */
export async function buildWhenNeeded(tell, signal) {
  if (builtId() === sourcesId()) return;
  tell('Building …');
  await runStep(process.execPath, [join(root, 'scripts/build.mjs')], { signal });
}
