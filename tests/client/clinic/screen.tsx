import { QueryClientProvider } from '@tanstack/react-query';
import { configure, render } from '@testing-library/react';
import type { ReactElement } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { RecordContext } from '#src/app/caring.ts';
import { recordOf } from '#src/app/record-choice.ts';
import { MeContext } from '#src/app/session.tsx';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';

export const clinic: Me['clinic'] = {
  id: '6a2b8c1d-3e4f-4a5b-8c6d-7e8f9a0b1c2d',
  name: 'Orchard Lane Shoulder Clinic',
  timeZone: 'America/New_York',
  emergencyNumber: '911',
  crisisNumber: '988',
  onCallNumber: '555-0110',
  phone: '555-0100',
  openNow: true,
  opensAt: null,
};

export const noorSignedIn: Me = {
  personId: '7a4d6f0e-0f38-4a5f-a1a5-0d5b3f2c9e31',
  name: 'Noor Haddad',
  email: 'noor.haddad@orchard-lane.example',
  roles: ['therapist'],
  clinic,
  patient: null,
  caresFor: [],
  secondFactor: 'given',
  session: { idleEndsAt: null, endsAt: '2026-12-02T07:00:00.000Z' },
  writeToken: 'token',
};

/** Whole screens are slow to draw where a machine is busy with other tests; what is awaited is an event all the same. */
configure({ asyncUtilTimeout: 8_000 });
vi.setConfig({ testTimeout: 30_000 });

/** `record`: the record of somebody else that the call was about. */
type Sent = { method: string; path: string; body: unknown; record?: string | undefined };
/** What the server answers to one request: a value is a success, a problem a refusal, `lost` no answer at all. */
export type Answer = (sent: Sent) => unknown;

/** Answers every call of the client, by method and path; what nobody answers for fails the test. */
export function serve(routes: Record<string, Answer>): Sent[] {
  const sent: Sent[] = [];
  vi.stubGlobal('fetch', async (address: string, init: RequestInit) => {
    const path = address.split('?')[0] ?? '';
    const method = init.method ?? 'GET';
    const answer = routes[`${method} ${path}`];
    if (!answer) throw new Error(`Nobody answers for ${method} ${path}.`);
    const body: unknown = typeof init.body === 'string' ? JSON.parse(init.body) : undefined;
    const record = new Headers(init.headers).get('x-espalier-patient') ?? undefined;
    sent.push({ method, path, body, record });
    const value = answer({ method, path, body, record });
    if (value === lost) throw new TypeError('Failed to fetch');
    if (value instanceof Problem) {
      return new Response(JSON.stringify(value.toBody()), {
        status: value.status,
        headers: { 'content-type': 'application/problem+json' },
      });
    }
    if (value === undefined) return new Response(null, { status: 204 });
    return new Response(JSON.stringify(value), { headers: { 'content-type': 'application/json' } });
  });
  return sent;
}

export const lost = Symbol('no answer');

/** Shows a part of a screen to somebody who is signed in, at an address. */
export async function showTo(me: Me, element: ReactElement, { at = '/', path = '*' } = {}) {
  await startI18n();
  await loadWords(['threads']);
  const queryClient = createQueryClient();
  queryClient.setDefaultOptions({ queries: { retry: false } });
  const router = createMemoryRouter([{ path, element }], { initialEntries: [at] });
  const shown = render(
    <QueryClientProvider client={queryClient}>
      <MeContext value={me}>
        <RecordContext value={recordOf(me)}>
          <RouterProvider router={router} />
        </RecordContext>
      </MeContext>
    </QueryClientProvider>,
  );
  return { ...shown, queryClient, router };
}
