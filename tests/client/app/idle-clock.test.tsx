import { QueryClientProvider } from '@tanstack/react-query';
import { act, renderHook } from '@testing-library/react';
import type { ReactNode } from 'react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { useIdleClock } from '#src/app/idle-clock.ts';
import { sessionQuery, useSession } from '#src/app/session.tsx';
import { createQueryClient } from '#src/lib/query-client.ts';
import { noorSignedIn, serve } from '../clinic/screen.tsx';

const startMs = Date.parse('2026-12-01T08:00:00.000Z');
const minute = 60_000;
const at = (minutes: number) => new Date(startMs + minutes * minute).toISOString();
const until = (idleEndsAt: string): Me => ({
  ...noorSignedIn,
  session: { idleEndsAt, endsAt: at(720) },
});

/** What the server holds: another tab may change it. */
let onServer: Me;

function start(me = until(at(15))) {
  onServer = me;
  const queryClient = createQueryClient();
  queryClient.setQueryData(sessionQuery.queryKey, { me });
  const wrapper = ({ children }: { children: ReactNode }) => (
    <QueryClientProvider client={queryClient}>{children}</QueryClientProvider>
  );
  const hook = renderHook(() => useIdleClock(useSession().data?.me?.session.idleEndsAt ?? null), { wrapper });
  return { queryClient, hook };
}

const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

beforeEach(() => {
  vi.useFakeTimers({ now: startMs });
  serve({
    'GET /api/session': () => ({ me: onServer }),
    'POST /api/session/activity': () => ({ idleEndsAt: at(99), endsAt: at(720) }),
  });
});
afterEach(() => {
  vi.useRealTimers();
});

describe('the idle clock', () => {
  it('warns a minute before the end and then ends the session here', async () => {
    const { queryClient, hook } = start();
    await pass(14 * minute - 1);
    expect(hook.result.current.warning).toBe(false);
    await pass(2);
    expect(hook.result.current.warning).toBe(true);
    await pass(minute);
    expect(queryClient.getQueryData(sessionQuery.queryKey)).toEqual({ me: null, ended: 'idle' });
  });

  it('does not warn when another tab has kept the session alive', async () => {
    const { hook, queryClient } = start();
    onServer = until(at(25));
    await pass(14 * minute + 1);
    expect(hook.result.current.warning).toBe(false);
    expect(queryClient.getQueryData(sessionQuery.queryKey)?.me?.session.idleEndsAt).toBe(at(25));
  });

  it('keeps the session when the person says so', async () => {
    const { hook, queryClient } = start();
    await pass(14 * minute + 1);
    await act(async () => hook.result.current.stay());
    await pass(0);
    expect(queryClient.getQueryData(sessionQuery.queryKey)?.me?.session.idleEndsAt).toBe(at(99));
    expect(hook.result.current.warning).toBe(false);
  });

  it('does not run where the person chose to stay signed in', async () => {
    const { hook, queryClient } = start({
      ...noorSignedIn,
      session: { idleEndsAt: null, endsAt: at(720) },
    });
    await pass(600 * minute);
    expect(hook.result.current.warning).toBe(false);
    expect(queryClient.getQueryData(sessionQuery.queryKey)?.me).not.toBeNull();
  });
});
