import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { extname, join } from 'node:path';
import { brotliCompressSync, constants, gzipSync } from 'node:zlib';
import { lock } from './lock.mjs';
import { root } from './places.mjs';
import { main, say, Stop } from './say.mjs';
import { builtId, filesBelow, sourcesId } from './sources.mjs';

const SERVER_ENTRIES = {
  web: 'server/index.ts',
  worker: 'workers/index.ts',
  fakes: 'server/fakes/index.ts',
  migrate: 'server/db/migrate.ts',
  demo: 'server/demo/index.ts',
};

const COMPRESSED = new Set(['.js', '.css', '.html', '.svg', '.json', '.webmanifest', '.txt', '.ttf']);
/** Below this, a compressed copy saves nothing that a packet would notice. */
const SMALLEST_COMPRESSED_BYTES = 1024;

async function buildClient() {
  const { build } = await import('vite');
  await build({ root, logLevel: 'warn', configFile: join(root, 'vite.config.ts') });
}

async function buildServer() {
  const missing = Object.values(SERVER_ENTRIES).filter((entry) => !existsSync(join(root, entry)));
  if (missing.length > 0) throw new Stop(`The build needs ${missing.join(', ')}.`);
  const { build } = await import('esbuild');
  await build({
    absWorkingDir: root,
    entryPoints: SERVER_ENTRIES,
    outdir: 'dist/server',
    bundle: true,
    packages: 'external',
    platform: 'node',
    target: 'node20',
    format: 'esm',
    sourcemap: true,
    logLevel: 'warning',
  });
}

/** Puts .gz and .br beside each file that the web serves, so that nothing is compressed per request. */
function compressClient() {
  for (const file of [...filesBelow(join(root, 'dist/client'))]) {
    const content = readFileSync(file);
    if (!COMPRESSED.has(extname(file)) || content.length < SMALLEST_COMPRESSED_BYTES) continue;
    writeFileSync(`${file}.gz`, gzipSync(content, { level: 9 }));
    const params = { [constants.BROTLI_PARAM_SIZE_HINT]: content.length };
    writeFileSync(`${file}.br`, brotliCompressSync(content, { params }));
  }
}

/** Builds `dist/` unless it already holds these sources. */
async function build() {
  const release = await lock(join(root, 'dist/.lock'), (pid) => say(`Waiting for another build (${pid}) …`));
  try {
    const buildId = sourcesId();
    if (builtId() === buildId) return;
    // Gone first and written last: an interrupted build is never taken for a finished one.
    rmSync(join(root, 'dist/build.json'), { force: true });
    rmSync(join(root, 'dist/server'), { recursive: true, force: true });
    process.env.BUILD_ID = buildId;
    await Promise.all([buildServer(), buildClient()]);
    compressClient();
    writeFileSync(join(root, 'dist/build.json'), `${JSON.stringify({ buildId })}\n`);
  } finally {
    release();
  }
}

await main(build);
