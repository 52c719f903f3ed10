import { QueryClientProvider } from '@tanstack/react-query';
import { act, render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider, useLocation } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { useHoldScreen } from '#src/app/caution-hold.ts';
import { RequireRole } from '#src/app/RequireRole.tsx';
import { beginSession, endSession } from '#src/app/session.tsx';
import { startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { lost, noorSignedIn, serve } from '../clinic/screen.tsx';

vi.mock('#src/lib/socket.ts', () => ({ connectHints: () => () => undefined }));

const patient: Me = { ...noorSignedIn, personId: 'ines', roles: ['patient'] };

function SignInPlace() {
  const place = useLocation();
  return (
    <p>
      Signed out {place.search} {JSON.stringify(place.state)}
    </p>
  );
}

function Held() {
  useHoldScreen(true);
  return <p>Call 911 now</p>;
}

function show(element = <p>Ines’s own data</p>) {
  const queryClient = createQueryClient();
  queryClient.setDefaultOptions({ queries: { retry: false } });
  const router = createMemoryRouter(
    [
      {
        element: <RequireRole anyOf={['patient']} />,
        children: [
          { path: '/today', element },
          { path: '/elsewhere', element: <p>Elsewhere</p> },
        ],
      },
      { path: '/sign-in', element: <SignInPlace /> },
      { path: '/round', element: <p>The morning round</p> },
    ],
    { initialEntries: ['/today'] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { queryClient, router };
}

beforeEach(startI18n);

describe('what stands behind a role', () => {
  it('is shown to whoever holds it', async () => {
    serve({ 'GET /api/session': () => ({ me: patient }) });
    show();
    expect(await screen.findByText('Ines’s own data')).toBeDefined();
  });

  it('sends whoever is not signed in to sign in, with the way back', async () => {
    serve({ 'GET /api/session': () => ({ me: null }) });
    show();
    expect((await screen.findByText(/Signed out/)).textContent).toContain('?then=%2Ftoday');
  });

  it('sends another role to its own first screen', async () => {
    serve({ 'GET /api/session': () => ({ me: noorSignedIn }) });
    show();
    expect(await screen.findByText('The morning round')).toBeDefined();
  });

  it('says so when the server cannot be reached, and never guesses who is there', async () => {
    serve({ 'GET /api/session': () => lost });
    show();
    expect(await screen.findByText('Espalier could not be reached.')).toBeDefined();
  });
});

describe('the end of a session', () => {
  it('hides the data, forgets it, and says why on the way to the sign-in page', async () => {
    serve({ 'GET /api/session': () => ({ me: patient }) });
    const { queryClient } = show();
    await screen.findByText('Ines’s own data');
    queryClient.setQueryData(['today'], { firstName: 'Ines' });
    act(() => endSession(queryClient, 'idle'));
    expect((await screen.findByText(/Signed out/)).textContent).toContain('"ended":"idle"');
    expect(screen.queryByText('Ines’s own data')).toBeNull();
    expect(queryClient.getQueryData(['today'])).toBeUndefined();
  });

  it('does not take a caution away from whoever is told to call; the rest goes', async () => {
    serve({ 'GET /api/session': () => ({ me: patient }) });
    const { queryClient, router } = show(<Held />);
    await screen.findByText('Call 911 now');
    queryClient.setQueryData(['today'], { firstName: 'Ines' });
    act(() => endSession(queryClient, 'ended'));
    expect(screen.getByText('Call 911 now')).toBeDefined();
    expect(queryClient.getQueryData(['today'])).toBeUndefined();
    await act(() => router.navigate('/elsewhere'));
    expect(await screen.findByText(/Signed out/)).toBeDefined();
  });

  it('leaves nothing of the first person to the next who signs in', async () => {
    serve({ 'GET /api/session': () => ({ me: patient }) });
    const { queryClient } = show();
    await screen.findByText('Ines’s own data');
    queryClient.setQueryData(['today'], { firstName: 'Ines' });
    act(() => beginSession(queryClient, { ...patient, personId: 'wendell' }));
    expect(queryClient.getQueryData(['today'])).toBeUndefined();
  });
});
