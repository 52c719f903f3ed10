import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { getAlert, postCheckIn } from '#shared/check-ins/contract.ts';
import type { getToday } from '#shared/plans/contract.ts';
import type { listMessages } from '#shared/threads/contract.ts';
import { buildAnnounced, call, sessionDoubted, setWriteToken } from '#src/lib/api.ts';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';
import { serverNow } from '#src/lib/server-clock.ts';

let answer: () => Response | Promise<Response>;
const fetched = vi.fn<(address: string, init: RequestInit) => Promise<Response>>(async () => answer());

const json = (body: unknown, init: ResponseInit = {}) =>
  new Response(JSON.stringify(body), {
    ...init,
    headers: { 'content-type': 'application/json', ...init.headers },
  });
const problem = (code: string, status: number) =>
  json(
    { type: `urn:espalier:problem:${code}`, title: 'A sentence.', status },
    { status, headers: { 'content-type': 'application/problem+json' } },
  );
const checkIn = {
  id: 'a3c0a6f4-2f0f-4f0c-9d36-0a1f5ad7a111',
  kind: 'daily' as const,
  answers: {},
  answeredAt: '2026-12-01T08:00:00.000Z',
  sentAt: '2026-12-01T08:00:00.000Z',
  rulesVersion: 'shipped-1',
};
const sent = () => {
  const [address, init] = fetched.mock.calls.at(-1)!;
  return { address, init, headers: new Headers(init.headers) };
};

beforeEach(() => {
  answer = () => json({});
  fetched.mockClear();
  vi.stubGlobal('fetch', fetched);
});
afterEach(() => {
  vi.unstubAllGlobals();
  setWriteToken(null);
});

describe('a call of the API', () => {
  it('fills the address from params and query', async () => {
    await call<typeof listMessages>('get', '/api/threads/:threadId/messages', {
      params: { threadId: 'a/b' },
      query: { after: 7 },
    });
    expect(sent().address).toBe('/api/threads/a%2Fb/messages?after=7');
  });

  it('carries the session’s token and JSON on a write, and neither on a read', async () => {
    setWriteToken('token-of-this-session');
    await call<typeof postCheckIn>('post', '/api/check-ins', { body: checkIn });
    expect(sent().headers.get('x-espalier-session')).toBe('token-of-this-session');
    expect(sent().headers.get('content-type')).toBe('application/json');
    await call<typeof getToday>('get', '/api/today', {});
    expect(sent().headers.has('x-espalier-session')).toBe(false);
  });

  it('throws a refusal as a problem with its code and words', async () => {
    answer = () => problem('not-found', 404);
    const refusal = call<typeof getAlert>('get', '/api/alerts/:alertId', { params: { alertId: 'x' } });
    await expect(refusal).rejects.toMatchObject({ code: 'not-found', status: 404, message: 'A sentence.' });
    await expect(refusal).rejects.toBeInstanceOf(ApiProblem);
  });

  it('counts a lost line and a stranger’s page as no answer, never as success', async () => {
    answer = () => Promise.reject(new TypeError('Failed to fetch'));
    await expect(call<typeof getToday>('get', '/api/today', {})).rejects.toBeInstanceOf(Unreachable);
    // A hotel's sign-in page answers 200 in HTML.
    answer = () => new Response('<p>Welcome to our Wi-Fi</p>', { headers: { 'content-type': 'text/html' } });
    const saved = call<typeof postCheckIn>('post', '/api/check-ins', { body: checkIn });
    await expect(saved).rejects.toBeInstanceOf(Unreachable);
  });

  it('announces that the server runs another build, and keeps quiet about its own', async () => {
    const heard = vi.fn();
    const stop = buildAnnounced.subscribe(heard);
    answer = () => json({}, { headers: { 'x-espalier-build': __BUILD_ID__ } });
    await call<typeof getToday>('get', '/api/today', {});
    expect(heard).not.toHaveBeenCalled();
    answer = () => json({}, { headers: { 'x-espalier-build': 'newer' } });
    await call<typeof getToday>('get', '/api/today', {});
    expect(heard).toHaveBeenCalledExactlyOnceWith('newer');
    stop();
  });

  it('tells the tab when the server no longer accepts its session', async () => {
    const heard = vi.fn();
    const stop = sessionDoubted.subscribe(heard);
    answer = () => problem('not-signed-in', 401);
    await expect(call<typeof getToday>('get', '/api/today', {})).rejects.toBeInstanceOf(ApiProblem);
    expect(heard).toHaveBeenCalledExactlyOnceWith('not-signed-in');
    stop();
  });

  it('learns the server’s clock, which decides when an idle session ends', async () => {
    const serverMs = Date.parse('2030-01-01T00:00:00Z');
    answer = () => json({}, { headers: { date: new Date(serverMs).toUTCString() } });
    await call<typeof getToday>('get', '/api/today', {});
    expect(Math.abs(serverNow() - serverMs)).toBeLessThan(5_000);
    answer = () => json({}, { headers: { date: new Date().toUTCString() } });
    await call<typeof getToday>('get', '/api/today', {});
  });
});
