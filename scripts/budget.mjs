import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { root } from './places.mjs';
import { main, say, Stop } from './say.mjs';
import { builtId, sourcesId } from './sources.mjs';

/** JavaScript that the first load of the patient's Today, signed in, may carry: bytes after gzip -9. */
const BUDGET_BYTES = 150_000;

/** What that load asks for: the entry, and the chunks that its route fetches before it can show. */
const TODAY = [
  'index.html',
  'src/app/shells/PatientShell.tsx',
  'src/pages/TodayPage.tsx',
  'src/locales/en/today.json',
  'src/locales/en/plan.json',
];

await main(() => {
  const client = join(root, 'dist/client');
  if (builtId() !== sourcesId()) throw new Stop('There is no build of these sources to measure.');
  const manifest = JSON.parse(readFileSync(join(client, '.vite/manifest.json'), 'utf8'));
  const files = new Map();
  const follow = (key) => {
    const chunk = manifest[key];
    if (chunk === undefined)
      throw new Stop(`The built client has no chunk "${key}": scripts/budget.mjs names it.`);
    if (files.has(chunk.file)) return;
    if (chunk.file.endsWith('.js')) files.set(chunk.file, 0);
    for (const imported of chunk.imports ?? []) follow(imported);
  };
  TODAY.forEach(follow);
  for (const file of files.keys())
    files.set(file, gzipSync(readFileSync(join(client, file)), { level: 9 }).length);
  const total = [...files.values()].reduce((sum, bytes) => sum + bytes, 0);
  for (const [file, bytes] of [...files].sort((a, b) => b[1] - a[1]))
    say(`${String(bytes).padStart(8)}  ${file}`);
  say(`${String(total).padStart(8)}  in all, of ${BUDGET_BYTES} allowed`);
  if (total > BUDGET_BYTES)
    throw new Stop(`The first load of Today is ${total - BUDGET_BYTES} bytes over its budget.`);
});
