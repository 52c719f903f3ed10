import { createECDH, createPublicKey, randomBytes, randomUUID, verify } from 'node:crypto';
import { createServer, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { decrypt } from 'http_ece';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { kindRules, notificationKinds } from '#shared/notifications/kinds.ts';
import type { Outgoing } from '#server/notifications/channels.ts';
import { openPush } from '#server/notifications/push.ts';
import { testSecrets, testVapidPrivateKey } from '#tests/support/secrets.ts';

const vapid = {
  publicKey: testSecrets.vapidPublicKey,
  privateKey: testVapidPrivateKey,
  subject: 'mailto:on-call@clinic.example',
};

/** A browser: its keys, and nothing of the sender's code. */
const browser = createECDH('prime256v1');
browser.generateKeys();
const auth = randomBytes(16).toString('base64url');
const subscription = {
  endpoint: 'https://push.example/push/the-device',
  p256dh: browser.getPublicKey('base64url'),
  auth,
};

const outgoing = (over: Partial<Outgoing> = {}): Outgoing => ({
  id: randomUUID(),
  clinicId: randomUUID(),
  kind: 'new-emergency',
  channel: 'push',
  path: '/round',
  email: 'noor@people.example',
  phone: '+12025550111',
  subscription,
  ...over,
});

let service: Server;
let fakeUrl: string;
let received: { url: string; headers: IncomingHttpHeaders; body: Buffer }[];
let answer: { status: number; location?: string };

beforeAll(async () => {
  service = createServer((request, response) => {
    void buffer(request).then((body) => {
      received.push({ url: request.url ?? '', headers: request.headers, body });
      response
        .writeHead(answer.status, answer.location ? { location: answer.location } : {})
        .end('{"reason":"x"}');
    });
  });
  await new Promise<void>((resolve) => service.listen(0, '127.0.0.1', resolve));
  fakeUrl = `http://127.0.0.1:${(service.address() as AddressInfo).port}`;
});

afterAll(async () => {
  service.closeAllConnections();
  await new Promise((resolve) => service.close(resolve));
});

beforeEach(() => {
  received = [];
  answer = { status: 201 };
});

const send = async (one: Outgoing) => {
  await openPush({ vapid, fakeUrl }).send(one);
  const [last] = received.slice(-1);
  if (!last) throw new Error('Nothing arrived.');
  return last;
};

const decrypted = (message: Buffer) =>
  decrypt(message, { version: 'aes128gcm', privateKey: browser, authSecret: auth }).toString();

describe('a push', () => {
  it('is read by the browser it is for, with the reference library of RFC 8291, and holds what to show', async () => {
    const one = outgoing();
    const { url, body, headers } = await send(one);
    expect(url).toBe('/push/the-device');
    expect(headers['content-encoding']).toBe('aes128gcm');
    expect(JSON.parse(decrypted(body))).toEqual({
      kind: 'new-emergency',
      id: one.id,
      title: 'Espalier',
      body: 'An emergency flag is waiting in the morning round. Please open it now.',
      path: '/round',
      urgency: 'high',
    });
  });

  it('says of every kind what it is about in general, and nothing of who or what', async () => {
    for (const kind of notificationKinds) {
      const { body } = await send(outgoing({ kind }));
      const payload = JSON.parse(decrypted(body)) as Record<string, string>;
      expect(Object.keys(payload).sort()).toEqual(['body', 'id', 'kind', 'path', 'title', 'urgency']);
      expect(`${payload.title} ${payload.body}`).not.toMatch(
        /noor|2025550111|people\.example|pain|shoulder|fever/i,
      );
      expect(payload.body!.length).toBeGreaterThan(10);
    }
  });

  // RFC 8030, sections 5.2 to 5.4.
  it('is kept an hour for an emergency and a day otherwise, and pages are marked urgent', async () => {
    for (const kind of notificationKinds) {
      const { headers } = await send(outgoing({ kind }));
      expect(Number(headers.ttl), kind).toBe(kind === 'new-emergency' ? 3_600 : 86_400);
      const isHigh = kindRules[kind].mustReach || kind === 'test';
      expect(headers.urgency, kind).toBe(isHigh ? 'high' : 'normal');
    }
  });

  it('takes the place of an older one of the same kind and place, and of no other', async () => {
    const topicOf = async (over: Partial<Outgoing>) => (await send(outgoing(over))).headers.topic;
    const topic = await topicOf({});
    // RFC 8030, section 5.4: at most 32 characters of base64url.
    expect(topic).toMatch(/^[A-Za-z0-9_-]{16,32}$/);
    expect(await topicOf({})).toBe(topic);
    expect(await topicOf({ path: '/round/other' })).not.toBe(topic);
    expect(await topicOf({ kind: 'new-urgent' })).not.toBe(topic);
  });

  // RFC 8292, sections 2 and 3: an ES256 token for the origin of the push service, for at most a day.
  it('is signed with the key that browsers know, for this push service and at most 24 hours', async () => {
    const { headers } = await send(outgoing());
    const [, token = '', key = ''] = /^vapid t=([^,]+), ?k=(.+)$/.exec(headers.authorization ?? '') ?? [];
    expect(key).toBe(vapid.publicKey);
    const [head = '', claims = '', signature = ''] = token.split('.');
    const point = Buffer.from(key, 'base64url');
    const publicKey = createPublicKey({
      format: 'jwk',
      key: {
        ...{ kty: 'EC', crv: 'P-256' },
        x: point.subarray(1, 33).toString('base64url'),
        y: point.subarray(33, 65).toString('base64url'),
      },
    });
    const signed = Buffer.from(`${head}.${claims}`);
    const given = Buffer.from(signature, 'base64url');
    expect(verify('sha256', signed, { key: publicKey, dsaEncoding: 'ieee-p1363' }, given)).toBe(true);
    const parse = (part: string): unknown => JSON.parse(Buffer.from(part, 'base64url').toString());
    expect(parse(head)).toMatchObject({ typ: 'JWT', alg: 'ES256' });
    const { aud, exp, sub } = parse(claims) as { aud: string; exp: number; sub: string };
    expect(aud).toBe('https://push.example');
    expect(sub).toBe(vapid.subject);
    const nowS = Date.now() / 1000;
    expect(exp).toBeGreaterThan(nowS);
    expect(exp).toBeLessThanOrEqual(nowS + 24 * 3_600);
  });
});

describe('what a push service answers', () => {
  const failure = async (status: number, location?: string): Promise<unknown> => {
    answer = { status, ...(location ? { location } : {}) };
    return send(outgoing()).then(
      () => null,
      (error: unknown) => error,
    );
  };

  // RFC 8030, section 7.3: 404 and 410 end a subscription.
  it('a browser that is gone is not tried again', async () => {
    for (const status of [404, 410]) expect(await failure(status)).toMatchObject({ reason: 'gone' });
  });

  it('what it does not take is not tried again', async () => {
    for (const status of [400, 401, 403, 413]) {
      expect(await failure(status), `${status}`).toMatchObject({ name: 'NotDeliverable', reason: 'refused' });
    }
  });

  it('while it is busy or broken the push is worth another try, remembered by a code alone', async () => {
    for (const status of [408, 429, 500, 502, 503]) {
      expect(await failure(status), `${status}`).toMatchObject({
        name: 'GatewayFailure',
        code: `http-${status}`,
      });
    }
  });

  it('a redirect leads nowhere', async () => {
    expect(await failure(307, `${fakeUrl}/elsewhere`)).toMatchObject({ reason: 'refused' });
    expect(received.map(({ url }) => url)).toEqual(['/push/the-device']);
  });

  it('where nobody answers the push is worth another try', async () => {
    const closed = createServer();
    await new Promise<void>((resolve) => closed.listen(0, '127.0.0.1', resolve));
    const { port } = closed.address() as AddressInfo;
    await new Promise((resolve) => closed.close(resolve));
    const push = openPush({ vapid, fakeUrl: `http://127.0.0.1:${port}` });
    await expect(push.send(outgoing())).rejects.toMatchObject({ code: 'ECONNREFUSED' });
  });
});

describe('where a push may go', () => {
  it('an address of a private network is refused before anything is sent, also when it was kept somehow', async () => {
    const push = openPush({ vapid });
    for (const endpoint of ['https://127.0.0.1/push', `${fakeUrl}/push`, 'https://localhost/push']) {
      const kept = outgoing({ subscription: { ...subscription, endpoint } });
      await expect(push.send(kept), endpoint).rejects.toMatchObject({ reason: 'refused' });
    }
    expect(received).toEqual([]);
  });

  it('on a machine of one’s own a real browser’s push goes to the fake and nowhere else', async () => {
    const endpoint = 'https://updates.push.services.example/wpush/v2/abc';
    const { url } = await send(outgoing({ subscription: { ...subscription, endpoint } }));
    expect(url).toBe('/push/elsewhere');
  });
});
