import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '#server/app.ts';
import { makeClinic, makePatient, testPassword, type TestPatient } from '#tests/support/clinic.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { checkInBody } from '../check-ins/bodies.ts';

let database: TestDatabase;
let web: TestWeb;
let patient: TestPatient;
let phone: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  patient = await makePatient(database, await makeClinic(database));
  phone = await web.signIn(patient);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const countCheckIns = async () => {
  const { rows } = await database.asSuperuser.query<{ n: number }>(
    'select count(*)::int as n from check_ins',
  );
  return rows[0]!.n;
};

/** A write as the page sends it, with some headers changed or left away. */
const write = (changes: Record<string, string | null>, body: BodyInit = JSON.stringify(checkInBody())) => {
  const headers = Object.entries({
    cookie: phone.cookie,
    origin: web.url,
    'content-type': 'application/json',
    'x-espalier-session': phone.me!.writeToken,
    ...changes,
  }).filter((header): header is [string, string] => header[1] !== null);
  return fetch(`${web.url}/api/check-ins`, { method: 'POST', headers, body });
};

describe('a write', () => {
  it('is taken from our own page', async () => {
    expect((await write({})).status).toBe(201);
  });

  it.each([
    ['without an origin', { origin: null }],
    ['from another origin', { origin: 'http://elsewhere.example' }],
    ['from the same host on another port', { origin: 'http://localhost:1' }],
    ['from a page without one', { origin: 'null' }],
    ['without the header of its session', { 'x-espalier-session': null }],
    ['with a header that is none', { 'x-espalier-session': 'x'.repeat(43) }],
  ])('is refused %s, and nothing is stored', async (_what, changes) => {
    const before = await countCheckIns();
    const answer = await write(changes);
    expect(answer.status).toBe(403);
    expect(await answer.json()).toMatchObject({ type: 'urn:espalier:problem:foreign-request' });
    expect(await countCheckIns()).toBe(before);
  });

  it("is refused with the header of another session, be it the same person's", async () => {
    const other = await web.signIn(patient);
    const before = await countCheckIns();
    expect((await write({ 'x-espalier-session': other.me!.writeToken })).status).toBe(403);
    expect(await countCheckIns()).toBe(before);
  });

  it.each([
    ['text/plain', JSON.stringify(checkInBody())],
    ['application/x-www-form-urlencoded', 'kind=daily'],
    ['multipart/form-data; boundary=b', '--b--'],
  ])('is refused as %s, and nothing is stored', async (type, body) => {
    const before = await countCheckIns();
    const answer = await write({ 'content-type': type }, body);
    expect(answer.status).toBe(415);
    expect(await countCheckIns()).toBe(before);
  });

  it('is refused as a form also when it signs in', async () => {
    const answer = await fetch(`${web.url}/api/session`, {
      method: 'POST',
      headers: { origin: web.url, 'content-type': 'application/x-www-form-urlencoded' },
      body: new URLSearchParams({ email: patient.email, password: testPassword }).toString(),
    });
    expect(answer.status).toBe(415);
    const foreign = await web
      .anonymous()
      .call(
        'post',
        '/api/session',
        { email: patient.email, password: testPassword },
        { origin: 'http://elsewhere.example' },
      );
    expect(foreign.status).toBe(403);
    expect(foreign.headers.getSetCookie()).toEqual([]);
  });
});

const flagsOf = (cookie: string): string[] => cookie.split('; ').slice(1).sort();

describe('the cookie', () => {
  it('is out of reach of scripts and of other sites on loopback', async () => {
    const answer = await web
      .anonymous()
      .call('post', '/api/session', { email: patient.email, password: testPassword });
    const [cookie = ''] = answer.headers.getSetCookie();
    expect(cookie).toMatch(/^espalier=/);
    expect(flagsOf(cookie)).toEqual(['HttpOnly', 'Path=/', 'SameSite=Lax']);
  });

  describe('off loopback', () => {
    let server: Server;
    let url: string;

    beforeAll(async () => {
      const { app } = createApp({
        pools: database.pools,
        clock: () => new Date(),
        log: silentLog,
        publicUrl: 'https://clinic.example',
        trustProxy: '1',
        sessionSecret: 'test-session-secret-of-32-characters',
        ...testSecrets,
        buildId: 'test',
      });
      server = createServer(app);
      await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
      url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    });

    afterAll(() => {
      server.closeAllConnections();
      server.close();
    });

    const signIn = (protocol: string) =>
      fetch(`${url}/api/session`, {
        method: 'POST',
        headers: {
          origin: 'https://clinic.example',
          'content-type': 'application/json',
          'x-forwarded-proto': protocol,
        },
        body: JSON.stringify({ email: patient.email, password: testPassword }),
      });

    it('is Secure and bound to the host, behind the one proxy that is trusted', async () => {
      const [cookie = ''] = (await signIn('https')).headers.getSetCookie();
      expect(cookie).toMatch(/^__Host-espalier=/);
      expect(flagsOf(cookie)).toEqual(['HttpOnly', 'Path=/', 'SameSite=Lax', 'Secure']);
    });

    it('is not sent over a connection that is not', async () => {
      expect((await signIn('http')).headers.getSetCookie()).toEqual([]);
    });
  });
});
