import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { dropForeignPush } from '#src/app/push-of-others.ts';
import { pushAbility, turnPushOff, turnPushOn } from '#src/app/push.ts';
import { serve } from '../clinic/screen.tsx';

/** A key of the right length (65 bytes, RFC 8291), and nothing but zeros. */
const key = 'A'.repeat(87);

/** As far as a page sees a browser's subscription; ending it ends it in the browser. */
function browser({ endpoint, permission = 'granted' }: { endpoint?: string; permission?: string } = {}) {
  const made = (at: string) => {
    const subscription = {
      endpoint: at,
      toJSON: () => ({ endpoint: at, keys: { p256dh: key, auth: 'B'.repeat(22) } }),
      unsubscribe: vi.fn(async () => {
        held = null;
        return true;
      }),
    };
    return subscription;
  };
  let held = endpoint === undefined ? null : made(endpoint);
  const subscribe = vi.fn<(options: unknown) => Promise<unknown>>(
    async () => (held = made('https://push.example/new')),
  );
  const registration = { pushManager: { getSubscription: async () => held, subscribe } };
  const register = vi.fn(async () => registration);
  const requestPermission = vi.fn(async () => permission);
  vi.stubGlobal('navigator', {
    userAgent: 'A browser',
    maxTouchPoints: 0,
    serviceWorker: {
      register,
      ready: Promise.resolve(registration),
      getRegistration: async () => registration,
    },
  });
  vi.stubGlobal('PushManager', class {});
  vi.stubGlobal('Notification', { permission, requestPermission });
  return { held: () => held?.endpoint ?? null, subscribe, register, requestPermission };
}

const card = (id: string, current: boolean) => ({
  id,
  deviceName: 'Firefox on Linux',
  createdAt: '2026-12-01T08:00:00.000Z',
  lastSentAt: null,
  current,
});
const mark = (personId: string, endpoint = 'https://push.example/old') =>
  localStorage.setItem('espalier-push', JSON.stringify({ personId, subscriptionId: 'sub-1', endpoint }));

beforeEach(() => localStorage.clear());
afterEach(() => {
  vi.unstubAllGlobals();
});

describe('turning push on', () => {
  it('asks for the permission, subscribes with the server’s key, and hands the subscription over', async () => {
    const { subscribe, register } = browser();
    const sent = serve({
      'GET /api/push-key': () => ({ publicKey: key }),
      'POST /api/push-subscriptions': () => card('sub-1', true),
    });
    expect(await turnPushOn('ines')).toBe(true);
    expect(register).toHaveBeenCalledExactlyOnceWith('/service-worker.js');
    expect(subscribe).toHaveBeenCalledExactlyOnceWith({
      userVisibleOnly: true,
      applicationServerKey: new Uint8Array(65),
    });
    expect(sent.at(-1)?.body).toEqual({
      endpoint: 'https://push.example/new',
      p256dh: key,
      auth: 'B'.repeat(22),
    });
  });

  it('does nothing at all when the person says no', async () => {
    const { register } = browser({ permission: 'denied' });
    const sent = serve({});
    expect(await turnPushOn('ines')).toBe(false);
    expect(register).not.toHaveBeenCalled();
    expect(sent).toEqual([]);
  });

  it('never takes over a subscription that was here before', async () => {
    const page = browser({ endpoint: 'https://push.example/of-somebody-else' });
    serve({
      'GET /api/push-key': () => ({ publicKey: key }),
      'POST /api/push-subscriptions': () => card('sub-1', true),
    });
    await turnPushOn('ines');
    expect(page.held()).toBe('https://push.example/new');
  });
});

it('turning push off ends it on the server and in the browser', async () => {
  const page = browser({ endpoint: 'https://push.example/old' });
  mark('ines');
  const sent = serve({ 'DELETE /api/push-subscriptions/sub-1': () => undefined });
  await turnPushOff('sub-1');
  expect(sent).toHaveLength(1);
  expect(page.held()).toBeNull();
  expect(localStorage).toHaveLength(0);
});

describe('at a sign-in on a device that carries a subscription', () => {
  it('that of somebody else goes, without asking the server and so also off line', async () => {
    const page = browser({ endpoint: 'https://push.example/old' });
    mark('wendell');
    const sent = serve({});
    await dropForeignPush('ines');
    expect(page.held()).toBeNull();
    expect(localStorage).toHaveLength(0);
    expect(sent).toEqual([]);
  });

  it('one of which nobody knows whose it is goes too', async () => {
    const page = browser({ endpoint: 'https://push.example/old' });
    serve({});
    await dropForeignPush('ines');
    expect(page.held()).toBeNull();
  });

  it('one’s own stays, and is handed to the new session', async () => {
    const page = browser({ endpoint: 'https://push.example/old' });
    mark('ines');
    const sent = serve({
      'GET /api/push-subscriptions': () => ({ subscriptions: [card('sub-1', false)] }),
      'POST /api/push-subscriptions': () => card('sub-1', true),
    });
    await dropForeignPush('ines');
    expect(page.held()).toBe('https://push.example/old');
    expect(sent.map(({ method }) => method)).toEqual(['GET', 'POST']);
  });

  it('one’s own that was removed from another device is not brought back', async () => {
    const page = browser({ endpoint: 'https://push.example/old' });
    mark('ines');
    const sent = serve({ 'GET /api/push-subscriptions': () => ({ subscriptions: [] }) });
    await dropForeignPush('ines');
    expect(page.held()).toBeNull();
    expect(sent.map(({ method }) => method)).toEqual(['GET']);
  });

  it('one that the browser renewed is told to the server, and the old one is removed there', async () => {
    browser({ endpoint: 'https://push.example/renewed' });
    mark('ines');
    const sent = serve({
      'GET /api/push-subscriptions': () => ({ subscriptions: [card('sub-1', true)] }),
      'POST /api/push-subscriptions': () => card('sub-2', true),
      'DELETE /api/push-subscriptions/sub-1': () => undefined,
    });
    await dropForeignPush('ines');
    expect(sent.map(({ method }) => method)).toEqual(['GET', 'POST', 'DELETE']);
  });
});

describe('what a browser can do', () => {
  it('is told apart: able, refused before, an iPhone’s home screen, and not at all', () => {
    browser();
    expect(pushAbility()).toBe('able');
    browser({ permission: 'denied' });
    expect(pushAbility()).toBe('denied');
    vi.unstubAllGlobals();
    vi.stubGlobal('navigator', { userAgent: 'Mozilla/5.0 (iPhone; CPU iPhone OS 18_1)', maxTouchPoints: 5 });
    expect(pushAbility()).toBe('needs-home-screen');
    vi.stubGlobal('navigator', { userAgent: 'Mozilla/5.0 (Macintosh; Intel)', maxTouchPoints: 5 });
    expect(pushAbility()).toBe('needs-home-screen');
    vi.stubGlobal('navigator', { userAgent: 'Mozilla/5.0 (Macintosh; Intel)', maxTouchPoints: 0 });
    expect(pushAbility()).toBe('unsupported');
  });
});
