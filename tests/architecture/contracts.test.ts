import { expect, it } from 'vitest';
import type { z } from 'zod';
import { permissions } from '#shared/access/permissions.ts';
import type { Contract } from '#shared/http/contract.ts';
import { isPublic } from '#server/http/route.ts';
import { allRoutes } from '#server/routes.ts';

const modules = import.meta.glob<Record<string, unknown>>('../../shared/**/*contract.ts', { eager: true });

const isContract = (value: unknown): value is Contract =>
  typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'summary' in value;

const contracts = Object.values(modules)
  .flatMap((module) => Object.values(module))
  .filter(isContract);

const routes = allRoutes(async () => null);

const addressOf = ({ method, path }: Contract): string => `${method} ${path}`;
/** Two paths that differ only in the names of their parameters are one address. */
const shapeOf = (contract: Contract): string => addressOf(contract).replaceAll(/:\w+/g, ':');

/** A reason is a sentence of words, not one word that fills the field. */
const sentence = /^[A-Z]\S* \S.*\.$/;

it('gives each method and path to one contract only', () => {
  expect(contracts.length).toBeGreaterThan(20);
  const shapes = contracts.map(shapeOf);
  expect(shapes.filter((shape, index) => shapes.indexOf(shape) !== index)).toEqual([]);
});

it('keeps every path below /api/, in lower case, with whole words', () => {
  const odd = contracts
    .map(({ path }) => path)
    .filter((path) => !/^\/api(\/([a-z]+(-[a-z]+)*|:[a-z][A-Za-z]*Id|:role))+$/.test(path));
  expect(odd).toEqual([]);
});

it('has one route for every contract, and no route without one', () => {
  expect(routes.map(({ contract }) => addressOf(contract)).sort()).toEqual(contracts.map(addressOf).sort());
  expect(routes.filter(({ contract }) => !contracts.includes(contract))).toEqual([]);
});

it('declares the parameters that stand in the path, and no others', () => {
  for (const contract of contracts) {
    const inPath = [...contract.path.matchAll(/:(\w+)/g)].map(([, name]) => name);
    const declared = Object.keys((contract.params as z.ZodObject | undefined)?.shape ?? {});
    expect(declared, addressOf(contract)).toEqual(inPath);
  }
});

it('reads with GET and writes with the others: only they take a body', () => {
  expect(contracts.filter(({ method, body }) => method === 'get' && body).map(addressOf)).toEqual([]);
  expect(contracts.filter(({ method, query }) => method !== 'get' && query).map(addressOf)).toEqual([]);
});

it('takes into an address no words that somebody typed: histories and logs keep addresses', () => {
  const words = 'Zebedee Quillfeather';
  const fields = contracts.flatMap((contract) =>
    [contract.params, contract.query].flatMap((part) =>
      Object.entries((part as z.ZodObject | undefined)?.shape ?? {}).map(([name, field]) => ({
        where: `${addressOf(contract)}: ${name}`,
        takesWords: (field as z.ZodType).safeParse(words).success,
      })),
    ),
  );
  expect(fields.length).toBeGreaterThan(20);
  expect(fields.filter(({ takesWords }) => takesWords).map(({ where }) => where)).toEqual([]);
});

it('answers 204 without content and everything else with a declared one', () => {
  for (const contract of contracts) {
    expect(contract.output === undefined, addressOf(contract)).toBe(contract.status === 204);
  }
});

it('opens every route by a permission that is granted to somebody, or says in a sentence why it is public', () => {
  for (const route of routes) {
    if (isPublic(route)) expect(route.access.public, addressOf(route.contract)).toMatch(sentence);
    else expect(permissions, addressOf(route.contract)).toContain(route.access.permission);
  }
});

it('keeps the public routes to the way in', () => {
  expect(
    routes
      .filter(isPublic)
      .map(({ contract }) => addressOf(contract))
      .sort(),
  ).toEqual([
    'get /api/session',
    'get /api/sign-in-page',
    'post /api/email-changes/use',
    'post /api/invitations/accept',
    'post /api/invitations/ask-again',
    'post /api/invitations/look',
    'post /api/invitations/passkey-question',
    'post /api/password-resets',
    'post /api/password-resets/use',
    'post /api/session',
    'post /api/session/passkey',
    'post /api/session/passkey-question',
    'post /api/session/second-factor',
    'post /api/session/second-factor/passkey-question',
  ]);
});

it('uses every permission at some route', () => {
  const used = new Set(routes.flatMap((route) => (isPublic(route) ? [] : [route.access.permission])));
  expect(permissions.filter((permission) => !used.has(permission))).toEqual([]);
});

it('writes an audit entry at every route, or says in a sentence why not', () => {
  for (const { contract, audit } of routes) {
    if (typeof audit === 'string')
      expect(audit, addressOf(contract)).toMatch(/^[a-z]+(-[a-z]+)*\.[a-z]+(-[a-z]+)*$/);
    else expect(audit.none, addressOf(contract)).toMatch(sentence);
  }
});
