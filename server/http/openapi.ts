import { z } from 'zod';
import { problems } from '#shared/problems/problems.ts';
import { isPublic, type Route } from './route.ts';

type Json = Record<string, unknown>;

const schemaOf = (schema: z.ZodType, io: 'input' | 'output'): Json => {
  const described = z.toJSONSchema(schema, { io, target: 'draft-2020-12' }) as Json;
  // The document names the dialect once for all its schemas.
  delete described.$schema;
  return described;
};

/** `/api/threads/:threadId` as OpenAPI writes it: `/api/threads/{threadId}`. */
const openApiPath = (path: string): string => path.replaceAll(/:([A-Za-z]+)/g, '{$1}');

const parametersOf = (schema: z.ZodType | undefined, place: 'path' | 'query'): Json[] => {
  if (!schema) return [];
  const { properties = {}, required = [] } = schemaOf(schema, 'input') as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, property]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema: property,
  }));
};

const operationOf = (route: Route): Json => {
  const { contract } = route;
  const parameters = [...parametersOf(contract.params, 'path'), ...parametersOf(contract.query, 'query')];
  const success = contract.output
    ? {
        description: 'Done.',
        content: { 'application/json': { schema: schemaOf(contract.output, 'output') } },
      }
    : { description: 'Done; no content.' };
  return {
    operationId: `${contract.method}:${contract.path}`,
    summary: contract.summary,
    description: isPublic(route)
      ? `Public: ${route.access.public}`
      : `Needs the permission \`${route.access.permission}\`.`,
    security: isPublic(route) ? [] : [{ session: [] }],
    ...(parameters.length > 0 ? { parameters } : {}),
    ...(contract.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: schemaOf(contract.body, 'input') } },
          },
        }
      : {}),
    responses: {
      [contract.status]: success,
      default: { $ref: '#/components/responses/Problem' },
    },
  };
};

/** The whole API as OpenAPI 3.1: a loop over the routes, so that it cannot say what the server does not do. */
export const openApiDocument = (routes: readonly Route[]): Json => {
  const paths: Record<string, Json> = {};
  for (const route of routes) {
    const path = openApiPath(route.contract.path);
    paths[path] = { ...paths[path], [route.contract.method]: operationOf(route) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Espalier', version: '1', description: 'The API behind the Espalier web client.' },
    paths,
    components: {
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'espalier' } },
      responses: {
        Problem: {
          description: `A problem (RFC 9457). Codes: ${Object.keys(problems).join(', ')}.`,
          content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
        },
      },
      schemas: {
        Problem: {
          type: 'object',
          required: ['type', 'title', 'status'],
          properties: {
            type: {
              type: 'string',
              enum: Object.keys(problems).map((code) => `urn:espalier:problem:${code}`),
            },
            title: { type: 'string' },
            status: { type: 'integer' },
            detail: { type: 'string' },
            errors: {
              type: 'array',
              items: {
                type: 'object',
                required: ['field', 'message'],
                properties: { field: { type: 'string' }, message: { type: 'string' } },
              },
            },
            retryAfter: { type: 'integer', description: 'Seconds until another try makes sense.' },
            claimedBy: { type: 'string' },
            reportId: { type: 'string' },
          },
        },
      },
    },
  };
};
