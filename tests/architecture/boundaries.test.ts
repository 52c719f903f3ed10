import { execFile } from 'node:child_process';
import { copyFile, mkdir, mkdtemp, readFile, realpath, rm, writeFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import type { ICruiseResult, IConfiguration } from 'dependency-cruiser';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { root } from '../../scripts/places.mjs';

const configFile = join(root, '.dependency-cruiser.cjs');
const config = createRequire(import.meta.url)(configFile) as IConfiguration;
const ruleNames = (config.forbidden ?? []).map((rule) => ('name' in rule ? rule.name : undefined));

type Tree = Record<string, string>;

/** A small product that keeps every border, among it the closest thing to each border that is allowed. */
const lawful: Tree = {
  'shared/plans/contract.ts': `import { z } from 'zod'; export const plan = z; export type Plan = string;`,
  'src/main.tsx': `export {};`,
  'src/lib/api.ts': `import type { Plan } from '#shared/plans/contract.ts'; export type Call = Plan;`,
  'src/components/Button.tsx': `import 'react'; export const Button = 1;`,
  'src/features/plans/queries.ts': `import type { Call } from '#src/lib/api.ts'; export type Query = Call;`,
  'src/features/plans/PlanForm.tsx': `import { plan } from '#shared/plans/contract.ts'; export const form = plan;`,
  'src/features/threads/ThreadView.tsx': `import { Button } from '#src/components/Button.tsx'; export const view = Button;`,
  'src/app/shells/PatientShell.tsx': `import '#src/features/threads/ThreadView.tsx';`,
  'src/pages/TodayPage.tsx': `import '#src/features/plans/PlanForm.tsx'; import '#src/features/threads/ThreadView.tsx';`,
  'server/index.ts': `export {};`,
  'server/http/mount.ts': `import 'express'; export const mount = 1;`,
  'server/db/schema/plans.ts': `import 'drizzle-orm'; export const plans = 1;`,
  'server/features/plans/queries.ts': `import { plans } from '../../db/schema/plans.ts'; export const all = plans;`,
  'server/features/plans/service.ts': `import { all } from './queries.ts'; export const serve = all;`,
  'server/features/plans/routes.ts': `import { serve } from './service.ts'; import { mount } from '../../http/mount.ts'; export const routes = [serve, mount];`,
  'workers/index.ts': `export {};`,
  'workers/work.ts': `import type { Suite } from 'vitest'; export type Work = Suite;`,
  'workers/tasks/review.ts': `import '#server/features/plans/service.ts';`,
  'tests/server/plans.test.ts': `import '#server/features/plans/service.ts'; import 'vitest';`,
  'tests/support/clinic.ts': `import 'vitest'; export const clinic = 1;`,
};

/** One violation of each rule: the file that commits it, and what it reaches for. */
const seeds: Record<string, { files: Tree; to: string }> = {
  'no-unresolvable-import': {
    files: { 'server/features/plans/lost.ts': `import './nowhere.ts';` },
    to: './nowhere.ts',
  },
  'no-cycle': {
    files: {
      // A cycle is reported once, at the first of its files by name.
      'shared/plans/egg.ts': `import type { Hen } from './hen.ts'; export type Egg = Hen;`,
      'shared/plans/hen.ts': `import type { Egg } from './egg.ts'; export type Hen = Egg;`,
    },
    to: 'shared/plans/hen.ts',
  },
  'no-orphan': { files: { 'server/alone.ts': `export {};` }, to: 'server/alone.ts' },
  'packages-are-declared': {
    files: { 'src/lib/undeclared.ts': `import 'left-over';` },
    to: 'node_modules/left-over/index.js',
  },
  'production-imports-no-test-code': {
    files: { 'server/db/sample.ts': `import { clinic } from '#tests/support/clinic.ts'; export { clinic };` },
    to: 'tests/support/clinic.ts',
  },
  'production-imports-no-development-package': {
    files: { 'server/db/assert.ts': `import { expect } from 'vitest'; export { expect };` },
    to: 'node_modules/vitest/index.js',
  },
  'shared-is-pure': {
    files: { 'shared/plans/files.ts': `import { readFile } from 'node:fs/promises'; export { readFile };` },
    to: 'fs/promises',
  },
  'client-imports-no-server': {
    files: {
      'src/features/plans/all.ts': `import type { all } from '#server/features/plans/queries.ts'; export type All = typeof all;`,
    },
    to: 'server/features/plans/queries.ts',
  },
  'server-imports-no-client': {
    files: { 'workers/button.ts': `import '#src/components/Button.tsx';` },
    to: 'src/components/Button.tsx',
  },
  'server-imports-no-worker': {
    files: { 'server/features/plans/now.ts': `import '#workers/tasks/review.ts';` },
    to: 'workers/tasks/review.ts',
  },
  'features-are-islands': {
    files: { 'src/features/plans/PlanThread.tsx': `import '#src/features/threads/ThreadView.tsx';` },
    to: 'src/features/threads/ThreadView.tsx',
  },
  'features-know-no-page': {
    files: { 'src/features/threads/place.ts': `import '#src/pages/TodayPage.tsx';` },
    to: 'src/pages/TodayPage.tsx',
  },
  'components-know-no-domain': {
    files: {
      'src/components/PlanTag.tsx': `import type { Plan } from '#shared/plans/contract.ts'; export type Tag = Plan;`,
    },
    to: 'shared/plans/contract.ts',
  },
  'lib-knows-no-screen': {
    files: { 'src/lib/toast.ts': `import '#src/components/Button.tsx';` },
    to: 'src/components/Button.tsx',
  },
  'schemas-as-values-in-forms-only': {
    files: {
      'src/features/plans/parse.ts': `import { plan } from '#shared/plans/contract.ts'; export const parse = plan;`,
    },
    to: 'shared/plans/contract.ts',
  },
  'http-alone-sees-requests': {
    files: {
      'server/features/plans/ask.ts': `import type { Request } from 'express'; export type Ask = Request;`,
    },
    to: 'node_modules/express/index.js',
  },
  'routes-hold-no-sql': {
    files: {
      'server/features/threads/routes.ts': `import { eq } from 'drizzle-orm'; export const routes = [eq];`,
    },
    to: 'node_modules/drizzle-orm/index.js',
  },
  'workers-reach-use-cases-only': {
    files: { 'workers/tasks/count.ts': `import '#server/features/plans/queries.ts';` },
    to: 'server/features/plans/queries.ts',
  },
  'workers-know-no-web': {
    files: { 'workers/tasks/answer.ts': `import '#server/http/mount.ts';` },
    to: 'server/http/mount.ts',
  },
};

const installed = ['zod', 'react', 'express', 'drizzle-orm', 'vitest', 'left-over'];

const manifestOfTree = async (): Promise<string> => {
  const { imports } = JSON.parse(await readFile(join(root, 'package.json'), 'utf8')) as { imports: unknown };
  const any = (names: string[]) => Object.fromEntries(names.map((name) => [name, '*']));
  return JSON.stringify({
    name: 'a-small-product',
    type: 'module',
    imports,
    dependencies: any(['zod', 'react', 'express', 'drizzle-orm']),
    devDependencies: any(['vitest']),
  });
};

type Violation = { rule: { name: string }; from: string; to: string };

/** Runs the command of `npm run check` over a tree of its own, so that the real one may be edited meanwhile. */
const violationsIn = async (folder: string, tree: Tree): Promise<Violation[]> => {
  const files: Tree = { ...tree, 'package.json': await manifestOfTree() };
  for (const name of installed) {
    const manifest = { name, version: '1.0.0', main: 'index.js' };
    files[`node_modules/${name}/package.json`] = JSON.stringify(manifest);
    files[`node_modules/${name}/index.js`] = 'module.exports = {};';
  }
  for (const [path, content] of Object.entries(files)) {
    await mkdir(join(folder, dirname(path)), { recursive: true });
    await writeFile(join(folder, path), content);
  }
  await copyFile(join(root, 'tsconfig.json'), join(folder, 'tsconfig.json'));
  const command = join(root, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs');
  const folders = ['src', 'server', 'shared', 'workers', 'tests'];
  const args = [command, '--config', configFile, '--output-type', 'json', ...folders];
  const printed = await new Promise<string>((resolve, reject) => {
    execFile(
      process.execPath,
      args,
      { cwd: folder, maxBuffer: 64 * 1024 * 1024 },
      (error, stdout, stderr) => {
        // Violations make it fail as well; without a result it failed in another way.
        if (stdout.startsWith('{')) resolve(stdout);
        else reject(new Error(stderr, { cause: error }));
      },
    );
  });
  const { summary } = JSON.parse(printed) as ICruiseResult;
  return summary.violations.filter(({ rule }) => rule.severity === 'error');
};

let folder: string;
let found: Violation[];

beforeAll(async () => {
  folder = await realpath(await mkdtemp(join(tmpdir(), 'espalier-boundaries-')));
  const broken = Object.assign({}, ...Object.values(seeds).map(({ files }) => files)) as Tree;
  found = await violationsIn(folder, { ...lawful, ...broken });
});

afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
});

it.each(Object.entries(seeds))('%s fires on its seed', (name, { files, to }) => {
  const fired = found.filter(({ rule }) => rule.name === name);
  const [from] = Object.keys(files);
  expect(fired.map((violation) => ({ from: violation.from, to: violation.to }))).toContainEqual({ from, to });
});

it('fires on nothing but the seeds', () => {
  const seeded = Object.values(seeds).flatMap(({ files }) => Object.keys(files));
  expect(found.filter(({ from }) => !seeded.includes(from))).toEqual([]);
});

it('has a seed for every rule, and the rule against unresolvable imports stands first', () => {
  expect(ruleNames[0]).toBe('no-unresolvable-import');
  expect(Object.keys(seeds)).toEqual(ruleNames);
  expect(config.required ?? []).toEqual([]);
  expect(config.allowed ?? []).toEqual([]);
});

it('lets every rule stop a check: none only warns', () => {
  expect((config.forbidden ?? []).filter(({ severity }) => severity !== 'error')).toEqual([]);
});
