import { cpSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { localFolder, root } from './places.mjs';
import { main, say, Stop } from './say.mjs';
import { runStep } from './steps.mjs';

const sqlFiles = (folder) => readdirSync(folder).filter((name) => name.endsWith('.sql'));

/** Generates migrations into a copy of `drizzle/`: a new one there means the schema has moved on without it. */
await main(async () => {
  const folder = localFolder('migration-drift');
  const copy = join(folder, 'drizzle');
  rmSync(copy, { recursive: true, force: true });
  cpSync(join(root, 'drizzle'), copy, { recursive: true });
  const config = join(folder, 'drizzle.config.ts');
  const base = relative(folder, join(root, 'drizzle.config.ts'));
  const out = relative(root, copy);
  writeFileSync(config, `import base from '${base}';\nexport default { ...base, out: '${out}' };\n`);
  const before = sqlFiles(copy);
  await runStep(join(root, 'node_modules/.bin/drizzle-kit'), [
    'generate',
    `--config=${relative(root, config)}`,
  ]);
  const added = sqlFiles(copy).filter((name) => !before.includes(name));
  for (const name of added) say(readFileSync(join(copy, name), 'utf8'));
  if (added.length > 0)
    throw new Stop(
      'The schema has changes without a migration (shown above): npx drizzle-kit generate --name=…',
    );
});
