import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { Validator } from '@seriousme/openapi-schema-validator';
import { Ajv2020 } from 'ajv/dist/2020.js';
import addFormats from 'ajv-formats';
import { expect, it } from 'vitest';
import { problems, problemType, type ProblemCode } from '#shared/problems/problems.ts';
import { openApiDocument } from '#server/http/openapi.ts';
import { isPublic } from '#server/http/route.ts';
import { allRoutes } from '#server/routes.ts';
import { root } from '../../scripts/places.mjs';

type Json = Record<string, unknown>;
type Operation = {
  operationId: string;
  summary: string;
  description: string;
  security: Json[];
  parameters?: { name: string; in: string }[];
  requestBody?: unknown;
  responses: Record<string, Json>;
};

const routes = allRoutes(async () => null);
const document = openApiDocument(routes);
const paths = document.paths as Record<string, Record<string, Operation>>;

const operations = Object.entries(paths).flatMap(([path, methods]) =>
  Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
);

const operationOf = (method: string, path: string): Operation => {
  const operation = paths[path.replaceAll(/:(\w+)/g, '{$1}')]?.[method];
  if (!operation) throw new Error(`${method} ${path} is not in the document.`);
  return operation;
};

/** Every JSON Schema in the document, with the place where it stands. */
const schemasIn = (value: unknown, place: string): [place: string, schema: Json][] => {
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value as Json).flatMap(([key, inner]) => {
    const here = `${place}/${key}`;
    if (key === 'schema') return [[here, inner as Json] as [string, Json]];
    if (place === '#/components/schemas') return [[here, inner as Json] as [string, Json]];
    return schemasIn(inner, here);
  });
};

// Source: the schema of OpenAPI 3.1 as published at https://spec.openapis.org/oas/3.1/schema, which the package
// @seriousme/openapi-schema-validator carries unchanged.
it('is a valid document by the schema of OpenAPI 3.1', async () => {
  const validator = new Validator();
  const result = await validator.validate(structuredClone(document));
  expect(result.errors ?? []).toEqual([]);
  expect(result.valid).toBe(true);
  expect(validator.version).toBe('3.1');
});

it('is told from an invalid document by that schema', async () => {
  const wrong = { ...structuredClone(document), paths: { 'no-slash': {} } };
  expect((await new Validator().validate(wrong)).valid).toBe(false);
});

// Source: JSON Schema 2020-12, the dialect of OpenAPI 3.1, in Ajv's own copy of its meta-schema. The schema of
// OpenAPI leaves the schemas inside a document out.
it('holds only schemas that JSON Schema 2020-12 accepts', () => {
  const ajv = addFormats(new Ajv2020({ strict: false }));
  const schemas = schemasIn(document, '#');
  expect(schemas.length).toBeGreaterThan(routes.length);
  const refused = schemas.filter(([, schema]) => !('$ref' in schema) && !ajv.validateSchema(schema));
  expect(refused.map(([place]) => place)).toEqual([]);
});

it('is committed as it is generated', async () => {
  const committed = await readFile(join(root, 'server/http/openapi.json'), 'utf8');
  expect(JSON.parse(committed)).toEqual(JSON.parse(JSON.stringify(document)));
});

it('holds every route, and nothing that is no route', () => {
  const described = operations.map(({ method, path }) => `${method} ${path}`).sort();
  const mounted = routes
    .map(({ contract: { method, path } }) => `${method} ${path.replaceAll(/:(\w+)/g, '{$1}')}`)
    .sort();
  expect(described).toEqual(mounted);
});

it.each(routes.map((route) => [`${route.contract.method} ${route.contract.path}`, route] as const))(
  'says of %s what it is for, what it needs, takes and gives',
  (_name, route) => {
    const { contract } = route;
    const operation = operationOf(contract.method, contract.path);
    expect(operation.summary).toMatch(/^[A-Z].{10,}\.$/s);
    expect(operation.security).toEqual(isPublic(route) ? [] : [{ session: [] }]);
    expect(operation.description).toContain(
      isPublic(route) ? route.access.public : `\`${route.access.permission}\``,
    );
    expect(operation.requestBody !== undefined).toBe(contract.body !== undefined);
    expect(Object.keys(operation.responses)).toEqual([String(contract.status), 'default']);
    expect(operation.responses.default).toEqual({ $ref: '#/components/responses/Problem' });
    const inPath = (operation.parameters ?? []).filter((parameter) => parameter.in === 'path');
    expect(inPath.map(({ name }) => name)).toEqual(
      [...contract.path.matchAll(/:(\w+)/g)].map(([, name]) => name),
    );
  },
);

it('names each operation once', () => {
  const ids = operations.map(({ operation }) => operation.operationId);
  expect(ids.length).toBeGreaterThan(0);
  expect(new Set(ids).size).toBe(ids.length);
});

it('lists every problem that a route may answer with', () => {
  const { schemas } = document.components as {
    schemas: { Problem: { properties: { type: { enum: string[] } } } };
  };
  const codes = Object.keys(problems) as ProblemCode[];
  expect(schemas.Problem.properties.type.enum).toEqual(codes.map(problemType));
});
