import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '#server/app.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';

let database: TestDatabase;

beforeAll(async () => {
  database = await cloneDatabase();
});

afterAll(() => database.drop());

const appAt = (publicUrl: string) =>
  createApp({
    pools: database.pools,
    clock: () => new Date(),
    log: silentLog,
    publicUrl,
    sessionSecret: 'test-session-secret-of-32-characters',
    ...testSecrets,
    buildId: 'build-7',
  }).app;

describe('what every answer carries', () => {
  it('names the build, so that an old tab can tell that it is old', async () => {
    const answer = await request(appAt('http://localhost:4600')).get('/api/session');
    expect(answer.headers['x-espalier-build']).toBe('build-7');
    expect(answer.headers['cache-control']).toBe('no-store');
  });

  // The directives are the project's own policy; their meaning is CSP Level 3 (W3C).
  it('carries the content policy, and asks for TLS only behind TLS', async () => {
    const plain = await request(appAt('http://localhost:4600')).get('/healthz');
    expect(plain.headers['content-security-policy']).toBe(
      "default-src 'self';script-src 'self';style-src-elem 'self' 'unsafe-inline';style-src-attr 'none';" +
        "img-src 'self' blob: data:;object-src 'none';base-uri 'self';form-action 'self';frame-ancestors 'none'",
    );
    expect(plain.headers['strict-transport-security']).toBeUndefined();
    const secure = await request(appAt('https://clinic.example')).get('/healthz');
    expect(secure.headers['content-security-policy']).toContain('upgrade-insecure-requests');
    expect(secure.headers['strict-transport-security']).toMatch(/max-age=\d+/);
  });

  it('does not say what serves it', async () => {
    const answer = await request(appAt('http://localhost:4600')).get('/healthz');
    expect(answer.headers['x-powered-by']).toBeUndefined();
  });
});

describe('an address that is none', () => {
  // RFC 9457, section 3.
  it('is a problem with a type, a title and a status', async () => {
    const answer = await request(appAt('http://localhost:4600')).get('/api/nothing-here');
    expect(answer.status).toBe(404);
    expect(answer.type).toBe('application/problem+json');
    expect(JSON.parse(answer.text)).toMatchObject({
      type: 'urn:espalier:problem:not-found',
      status: 404,
      title: expect.any(String) as string,
    });
  });
});

it('serves the document of the API that is committed', async () => {
  const answer = await request(appAt('http://localhost:4600')).get('/api/openapi.json');
  const { default: committed } = await import('#server/http/openapi.json', { with: { type: 'json' } });
  expect(answer.body).toEqual(committed);
});
