import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { getTableName, isTable } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { may, permissions, roles } from '#shared/access/permissions.ts';
import * as gate from '#server/db/schema/gate.ts';
import { demoAccounts } from '#server/demo/accounts.ts';
import { root } from '../../scripts/places.mjs';

const read = (path: string): string => readFileSync(join(root, path), 'utf8');

const readme = read('README.md');
const developers = read('DEVELOPERS.md');
const documents = [
  ['README.md', readme],
  ['DEVELOPERS.md', developers],
] as const;

const matches = (text: string, pattern: RegExp): string[] =>
  [...text.matchAll(pattern)].map((match) => match[1] ?? '');

/** What stands between a heading and the next one of its level or above. */
const section = (text: string, heading: string): string => {
  const level = /^#+/.exec(heading)?.[0].length ?? 0;
  const from = text.indexOf(`\n${heading}\n`);
  if (from < 0) throw new Error(`There is no heading "${heading}".`);
  const rest = text.slice(from + heading.length + 2);
  const next = rest.search(new RegExp(`^#{1,${level}} `, 'm'));
  return next < 0 ? rest : rest.slice(0, next);
};

/** The cells of the only table of a section, without its head. */
const tableOf = (text: string): string[][] =>
  text
    .split('\n')
    .filter((line) => line.startsWith('|'))
    .slice(2)
    .map((line) =>
      line
        .slice(1, -1)
        .split('|')
        .map((cell) => cell.trim()),
    );

/** The name by which a heading is linked to. */
const anchorOf = (heading: string): string =>
  heading
    .toLowerCase()
    .replaceAll(/[^\w\s-]/g, '')
    .replaceAll(' ', '-');

describe.each(documents)('%s', (_name, text) => {
  it('names only files and folders that are there', () => {
    const paths = matches(text, /`((?:src|server|shared|workers|tests|scripts|drizzle)\/[^\s`<…]*)`/g);
    expect(paths.filter((path) => !existsSync(join(root, path)))).toEqual([]);
  });

  it('links only to files and headings that are there', () => {
    const links = matches(text, /\]\(([^)]+)\)/g);
    const broken = links.filter((link) => {
      const [path = '', anchor] = link.split('#');
      if (path !== '' && !existsSync(join(root, path))) return true;
      const target = path === '' ? text : path.endsWith('.md') ? read(path) : '';
      return (
        anchor !== undefined &&
        !matches(target, /^#+ (.+)$/gm)
          .map(anchorOf)
          .includes(anchor)
      );
    });
    expect(broken).toEqual([]);
  });

  it('names only commands that are there', () => {
    const { scripts } = JSON.parse(read('package.json')) as { scripts: Record<string, string> };
    const npm = matches(text, /\bnpm (?:run )?([a-z:]+)/g).filter((name) => name !== 'ci');
    expect(npm.filter((name) => !(name in scripts))).toEqual([]);
    const tools = matches(text, /\bnpx ([a-z-]+)/g);
    expect(tools.filter((name) => !existsSync(join(root, 'node_modules/.bin', name)))).toEqual([]);
    const files = matches(text, /\b(?:node|npx \w+(?: \w+)?) ((?:scripts|server|tests)\/[\w./-]+)/g);
    expect(files.filter((path) => !existsSync(join(root, path)))).toEqual([]);
  });
});

it('finds each function in the file that DEVELOPERS.md names beside it', () => {
  const pairs = [
    ...developers.matchAll(/`(\w+)[^`]*`,? (?:in|of) (?:`\w+` in )?`([\w./-]+\.(?:tsx?|mjs))`/g),
  ];
  expect(pairs.length).toBeGreaterThan(25);
  const missing = pairs.filter(([, name, path]) => !new RegExp(`\\b${name}\\b`).test(read(path ?? '')));
  expect(missing.map(([found]) => found)).toEqual([]);
});

it('shows the grants as they are', () => {
  const shown = tableOf(section(developers, '## Access').split('**Doors.**')[0] ?? '');
  const granted = permissions.map((permission) => [
    `\`${permission}\``,
    ...roles.map((role) => (may([role], permission) ? 'yes' : '')),
  ]);
  expect(shown).toEqual(granted);
});

it('gives the reason for every table outside the fence', () => {
  const shown = tableOf(section(developers, '## Access').split('**Gate.**')[1] ?? '').map(([name]) => name);
  const outside = Object.values(gate)
    .filter((value) => isTable(value))
    .map((table) => `\`${getTableName(table)}\``);
  expect(shown).toEqual(outside);
});

it('names for every guarantee the test that holds it', () => {
  const rows = tableOf(section(developers, '## Guarantees'));
  expect(rows.length).toBeGreaterThan(0);
  const without = rows.filter(([, held = '']) => matches(held, /`(tests\/[^`]+\.test\.tsx?)`/g).length === 0);
  expect(without).toEqual([]);
});

it('tells of every decision the context, the decision and the consequence', () => {
  const entries = section(developers, '## Decisions').split('\n### ').slice(1);
  expect(entries.length).toBeGreaterThan(0);
  for (const entry of entries) {
    expect(matches(entry, /^_(\w+)\._/gm), entry.split('\n')[0]).toEqual([
      'Context',
      'Decision',
      'Consequence',
    ]);
  }
});

it('lists the demo accounts as they are', () => {
  const shown = tableOf(section(readme, '## Demo accounts'));
  expect(shown).toEqual(demoAccounts.map(({ who, role, email, password }) => [who, role, email, password]));
});

it('names only settings that something reads', () => {
  const scripts = readdirSync(join(root, 'scripts')).map((name) => `scripts/${name}`);
  const readers = [...scripts, 'server/env.ts'].map(read).join('\n');
  const names = tableOf(section(readme, '## Settings')).flatMap(([cell = '']) => matches(cell, /`(\w+)`/g));
  expect(names.length).toBeGreaterThan(5);
  expect(names.filter((name) => !new RegExp(`\\b${name}\\b`).test(readers))).toEqual([]);
});
