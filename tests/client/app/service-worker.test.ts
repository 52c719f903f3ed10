import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { runInNewContext } from 'node:vm';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { safePlace } from '#src/app/home.ts';

const source = readFileSync(join(process.cwd(), 'public/service-worker.js'), 'utf8');
const origin = 'https://espalier.example';

type Listener = (event: Record<string, unknown>) => void;
type Tab = { navigate: (path: string) => Promise<Tab>; focus: () => Promise<void> };

let listeners: Record<string, Listener>;
let tabs: Tab[];
const showNotification = vi.fn(async () => undefined);
const subscribe = vi.fn(async () => undefined);
const openWindow = vi.fn(async () => undefined);

/** Runs the very file that is served, in the surroundings that a browser gives it. */
beforeEach(() => {
  listeners = {};
  tabs = [];
  [showNotification, subscribe, openWindow].forEach((spy) => spy.mockClear());
  const self = {
    location: { origin },
    addEventListener: (name: string, listener: Listener) => (listeners[name] = listener),
    registration: { showNotification, pushManager: { subscribe } },
    clients: { matchAll: async () => tabs, openWindow, claim: async () => undefined },
    skipWaiting: async () => undefined,
  };
  runInNewContext(source, { self, URL });
});

async function dispatch(name: string, event: Record<string, unknown>): Promise<void> {
  let done: unknown;
  listeners[name]!({ ...event, waitUntil: (work: unknown) => (done = work) });
  await done;
}
const push = (data: unknown) =>
  dispatch('push', { data: { json: () => JSON.parse(JSON.stringify(data)) as unknown } });
const click = async (path: unknown) => {
  const notification = { close: vi.fn(), data: { path } };
  await dispatch('notificationclick', { notification });
  expect(notification.close).toHaveBeenCalledOnce();
};

describe('a push', () => {
  it('shows the words that it carries, one notice for each place', async () => {
    await push({ title: 'Espalier', body: 'A new message is waiting for you.', path: '/messages/42' });
    expect(showNotification).toHaveBeenCalledExactlyOnceWith(
      'Espalier',
      expect.objectContaining({
        body: 'A new message is waiting for you.',
        tag: '/messages/42',
        renotify: true,
        data: { path: '/messages/42' },
      }),
    );
  });

  it.each([
    ['is empty', { data: null }],
    ['cannot be read', { data: { json: () => JSON.parse('{broken') as unknown } }],
    ['carries no words', { data: { json: () => ({ path: '/today' }) } }],
  ])('is shown in neutral words when it %s', async (_, event) => {
    await dispatch('push', event);
    expect(showNotification).toHaveBeenCalledExactlyOnceWith(
      'Espalier',
      expect.objectContaining({ body: 'Something is waiting for you. Sign in to read it.' }),
    );
  });

  it.each([
    'https://evil.example/x',
    '//evil.example/x',
    '/\\evil.example',
    'javascript:alert(1)',
    42,
    undefined,
  ])('leads nowhere but into this site: %s', async (path) => {
    await push({ title: 'Espalier', body: 'Words.', path });
    expect(showNotification).toHaveBeenCalledExactlyOnceWith(
      'Espalier',
      expect.objectContaining({ data: { path: '/' } }),
    );
  });
});

describe('a press on a notice', () => {
  it('takes an open tab there and brings it to the front', async () => {
    const focus = vi.fn(async () => undefined);
    const tab: Tab = { navigate: vi.fn(async () => tab), focus };
    tabs = [tab];
    await click('/messages/42');
    expect(tab.navigate).toHaveBeenCalledExactlyOnceWith('/messages/42');
    expect(focus).toHaveBeenCalledOnce();
    expect(openWindow).not.toHaveBeenCalled();
  });

  it('opens a new one where none is open, or where the open one cannot be moved', async () => {
    await click('/messages/42');
    tabs = [{ navigate: () => Promise.reject(new TypeError('not controlled')), focus: vi.fn() }];
    await click('/messages/42');
    expect(openWindow.mock.calls).toEqual([['/messages/42'], ['/messages/42']]);
  });

  it('never leaves this site', async () => {
    await click('https://evil.example/x');
    expect(openWindow).toHaveBeenCalledExactlyOnceWith('/');
  });

  it('names a place that the sign-in page goes on to', () => {
    expect(safePlace('/messages/42')).toBe('/messages/42');
  });
});

describe('the service worker', () => {
  it('subscribes anew when the browser has dropped the old subscription', async () => {
    const applicationServerKey = new ArrayBuffer(65);
    await dispatch('pushsubscriptionchange', {
      oldSubscription: { options: { applicationServerKey } },
      newSubscription: null,
    });
    expect(subscribe).toHaveBeenCalledExactlyOnceWith({ userVisibleOnly: true, applicationServerKey });
  });

  it('keeps nothing: it answers no request and opens no cache', () => {
    expect(Object.keys(listeners).sort()).toEqual([
      'activate',
      'install',
      'notificationclick',
      'push',
      'pushsubscriptionchange',
    ]);
    expect(source).not.toMatch(/\bcaches\b|indexedDB|localStorage/);
  });
});
