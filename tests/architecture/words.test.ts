import { readdirSync, readFileSync } from 'node:fs';
import { basename, extname, join, relative } from 'node:path';
import { expect, it } from 'vitest';
import { root } from '../../scripts/places.mjs';

/** What is made and not written: the folders of .gitignore, and the history itself. */
const ignored = new Set([
  '.git',
  ...readFileSync(join(root, '.gitignore'), 'utf8')
    .split('\n')
    .filter((line) => line.endsWith('/'))
    .map((line) => line.slice(0, -1)),
]);

function* filesBelow(folder: string): Generator<string> {
  for (const entry of readdirSync(folder, { withFileTypes: true })) {
    if (ignored.has(entry.name)) continue;
    const path = join(folder, entry.name);
    if (entry.isDirectory()) yield* filesBelow(path);
    else if (entry.isFile()) yield path;
  }
}

const own = [...filesBelow(root)].map((path) => relative(root, path)).sort();
const pictures = new Set(['.png', '.jpg', '.webp', '.ico', '.woff2', '.ttf']);
const texts = own
  .filter((path) => !pictures.has(extname(path)))
  .map((path) => ({ path, text: readFileSync(join(root, path), 'utf8') }));

const codeEnds = new Set(['.ts', '.tsx', '.mjs', '.cjs', '.js', '.css']);
const code = texts.filter(({ path }) => codeEnds.has(extname(path)));
const tests = code.filter(({ path }) => path.startsWith('tests/'));

/** The lines that match, as `path:line: text`. */
const linesWith = (files: typeof texts, pattern: RegExp): string[] =>
  files.flatMap(({ path, text }) =>
    text
      .split('\n')
      .flatMap((line, index) =>
        pattern.test(line) ? [`${path}:${index + 1}: ${line.trim().slice(0, 120)}`] : [],
      ),
  );

// The patterns are put together from parts, so that this file does not hold what it looks for.
const any = (...words: [string, string][]): string => words.map((parts) => parts.join('')).join('|');

it('looks at the whole of the project', () => {
  for (const folder of ['src', 'server', 'shared', 'workers', 'scripts', 'tests', 'drizzle']) {
    expect(own.filter((path) => path.startsWith(`${folder}/`)).length, folder).toBeGreaterThan(0);
  }
  expect(own).toContain('package.json');
});

it('leaves nothing for later', () => {
  expect(
    linesWith(texts, new RegExp(`\\b(${any(['TO', 'DO'], ['FIX', 'ME'], ['XX', 'X'], ['HA', 'CK'])})\\b`)),
  ).toEqual([]);
});

it('skips no test, and runs none alone', () => {
  const marks = any(
    ['sk', 'ip'],
    ['on', 'ly'],
    ['to', 'do'],
    ['fix', 'me'],
    ['fai', 'ls'],
    ['run', 'If'],
    ['skip', 'If'],
  );
  expect(
    linesWith(
      tests,
      new RegExp(`\\b(it|test|describe|suite|bench)\\.(${marks})\\b|\\b(x|f)(it|describe)\\(`),
    ),
  ).toEqual([]);
});

it('turns no check of the compiler or the linter off', () => {
  const marks = any(
    ['eslint-', 'disable'],
    ['@ts-', 'ignore'],
    ['@ts-', 'nocheck'],
    ['@ts-', 'expect-error'],
    ['prettier-', 'ignore'],
  );
  expect(linesWith(code, new RegExp(marks))).toEqual([]);
});

it('names no place of a single machine', () => {
  const homes = any(
    ['/ro', 'ot/'],
    ['/ho', 'me/'],
    ['/Us', 'ers/'],
    ['/wo', 'rk/main'],
    ['/tm', 'p/'],
    ['C:\\\\', 'Users'],
  );
  expect(linesWith(texts, new RegExp(`(^|[\\s"'\`(=:])(file://)?(${homes})`))).toEqual([]);
});

it('names no package registry', () => {
  const hosts = any(
    ['registry\\.np', 'mjs'],
    ['registry\\.ya', 'rnpkg'],
    ['npm\\.pkg\\.git', 'hub'],
    ['arti', 'factory'],
    ['verd', 'accio'],
  );
  expect(linesWith(texts, new RegExp(`${hosts}|://(npm|registry|nexus|mirror)[.:]`, 'i'))).toEqual([]);
});

it('calls every file and folder by what it is about', () => {
  const vague = /^(utils?|helpers?|common|misc|shared-?utils|lib|stuff|tools?|index)$/i;
  const named = code.flatMap(({ path }) => {
    const parts = path.split('/');
    const file = basename(path).split('.')[0] ?? '';
    return [...parts.slice(0, -1), file].filter((part) => vague.test(part)).map((part) => `${path}: ${part}`);
  });
  // `lib` is the client's ground floor, and an `index.ts` is an entry point that is started, never imported.
  const entries = ['server/index.ts', 'server/demo/index.ts', 'server/fakes/index.ts', 'workers/index.ts'];
  expect(
    named.filter(
      (one) =>
        !/^(src|tests\/client)\/lib\//.test(one) && !entries.some((entry) => one === `${entry}: index`),
    ),
  ).toEqual([]);
});

const longestFileLines = 250;

it(`has no file of code over ${longestFileLines} lines`, () => {
  const long = code
    .map(({ path, text }) => ({ path, lines: text.trimEnd().split('\n').length }))
    .filter(({ lines }) => lines > longestFileLines);
  expect(long).toEqual([]);
});

it('uses invented people only: every mail address and telephone number is a reserved one', () => {
  const addresses = texts.flatMap(({ path, text }) =>
    [...text.matchAll(/[\w.+-]+@([\w-]+\.)+[a-z]{2,}/g)].map(([address]) => `${path}: ${address}`),
  );
  expect(addresses.filter((one) => !/\.(example|test|invalid)$/.test(one))).toEqual([]);
  const numbers = texts.flatMap(({ path, text }) =>
    [...text.matchAll(/\(?\b\d{3}\)?[ -]\d{3}-\d{4}\b/g)].map(([number]) => `${path}: ${number}`),
  );
  expect(numbers.filter((one) => !/555-01\d\d$/.test(one))).toEqual([]);
});
