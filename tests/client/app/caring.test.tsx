import { QueryClientProvider, useQuery } from '@tanstack/react-query';
import { act, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider, useLocation } from 'react-router-dom';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { getToday } from '#shared/plans/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { useRecord } from '#src/app/caring.ts';
import { useHoldScreen } from '#src/app/caution-hold.ts';
import { recordOf } from '#src/app/record-choice.ts';
import { RequireRecord } from '#src/app/RequireRecord.tsx';
import { RequireRole } from '#src/app/RequireRole.tsx';
import { sessionQuery } from '#src/app/session.tsx';
import { call } from '#src/lib/api.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { CaringPage } from '#src/pages/CaringPage.tsx';
import { serve } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { ines, inesHerself, marta, wendell } from './caring-people.ts';

vi.mock('#src/lib/socket.ts', () => ({ connectHints: () => () => undefined }));

const user = userEvent.setup({ delay: null });

/** Stands for a patient's screen: whose record it is, and what was fetched of it. */
function Page() {
  const { caring } = useRecord();
  const today = useQuery({
    queryKey: ['today'],
    queryFn: () => call<typeof getToday>('get', '/api/today', {}),
  });
  return (
    <p>
      Page of {caring?.name ?? 'one’s own'}, day {today.data?.day ?? 'unknown'}
    </p>
  );
}

function Held() {
  useHoldScreen(true);
  return <p>Call 911 now</p>;
}

function SignInPlace() {
  return <p>Signed out {JSON.stringify(useLocation())}</p>;
}

async function show(at = '/today', element = <Page />) {
  await startI18n();
  await loadWords(['caring', 'account']);
  const queryClient = createQueryClient();
  queryClient.setDefaultOptions({ queries: { retry: false } });
  const router = createMemoryRouter(
    [
      {
        element: <RequireRole anyOf={['patient', 'caregiver']} />,
        children: [
          { path: '/caring', element: <CaringPage /> },
          {
            element: <RequireRecord />,
            children: [
              { path: '/today', element },
              { path: '/messages/:id', element },
            ],
          },
        ],
      },
      { path: '/sign-in', element: <SignInPlace /> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { queryClient, router };
}

/** Wendell's day is the fourth, that of everybody else the twenty-fourth. */
const today: Answer = ({ record }) => ({ day: record === wendell.id ? 4 : 24 });

let me: Me;
const signedIn = (person: Me, routes: Record<string, Answer> = {}) => {
  me = person;
  return serve({ 'GET /api/session': () => ({ me }), 'GET /api/today': today, ...routes });
};

beforeEach(() => sessionStorage.clear());

describe('whose record a tab acts on', () => {
  it('is one’s own, without a word, for a patient', async () => {
    const sent = signedIn(inesHerself());
    await show();
    expect(await screen.findByText('Page of one’s own, day 24')).toBeDefined();
    expect(screen.queryByText(/^For /)).toBeNull();
    expect(sent.find(({ path }) => path === '/api/today')?.record).toBeUndefined();
  });

  it('is that of the only person somebody looks after, whose name stands over the screen', async () => {
    const sent = signedIn(marta([wendell]));
    await show();
    expect(await screen.findByText('Page of Wendell Osei, day 4')).toBeDefined();
    expect(screen.getByText('For Wendell Osei')).toBeDefined();
    expect(sent.find(({ path }) => path === '/api/today')?.record).toBe(wendell.id);
  });

  it('is asked for where there are several, and the way goes on to where it was going', async () => {
    const sent = signedIn(marta([ines, wendell]));
    const { router } = await show('/messages/42');
    await user.click(await screen.findByRole('button', { name: 'Wendell Osei' }));
    expect(await screen.findByText('Page of Wendell Osei, day 4')).toBeDefined();
    expect(router.state.location.pathname).toBe('/messages/42');
    expect(sent.find(({ path }) => path === '/api/today')?.record).toBe(wendell.id);
  });

  it('is kept for the person in this tab, and not for another person who signs in here', () => {
    const person = marta([ines, wendell]);
    sessionStorage.setItem(`espalier-record:${person.personId}`, wendell.id);
    expect(recordOf(person)?.caring?.name).toBe('Wendell Osei');
    expect(recordOf({ ...person, personId: 'somebody-else' })).toBeNull();
  });
});

describe('going over to another record', () => {
  it('shows nothing of the one before, and asks about the new one', async () => {
    const sent = signedIn(marta([ines, wendell]));
    const { router, queryClient } = await show('/caring');
    await user.click(await screen.findByRole('button', { name: 'Ines Valcourt' }));
    expect(await screen.findByText('Page of Ines Valcourt, day 24')).toBeDefined();
    queryClient.setQueryData(['threads', 'list'], ['of Ines']);
    await act(() => router.navigate('/caring'));
    await user.click(await screen.findByRole('button', { name: 'Wendell Osei' }));
    expect(screen.queryByText(/day 24/)).toBeNull();
    expect(await screen.findByText('Page of Wendell Osei, day 4')).toBeDefined();
    expect(queryClient.getQueryData(['threads', 'list'])).toBeUndefined();
    expect(sent.filter(({ path }) => path === '/api/today').map(({ record }) => record)).toEqual([
      ines.id,
      wendell.id,
    ]);
  });

  it('offers one’s own page beside those of others', async () => {
    signedIn({ ...inesHerself(), caresFor: [wendell] });
    await show('/caring');
    expect(await screen.findByRole('button', { name: 'My own page' })).toBeDefined();
    expect(screen.getByRole('button', { name: 'Wendell Osei' })).toBeDefined();
  });
});

describe('the end of care', () => {
  it('takes the page away, forgets what was fetched, and says so', async () => {
    signedIn(marta([wendell]));
    const { queryClient, router } = await show();
    await screen.findByText('Page of Wendell Osei, day 4');
    me = { ...me, caresFor: [] };
    await act(() => queryClient.refetchQueries(sessionQuery));
    expect(await screen.findByText('You no longer look after this person here')).toBeDefined();
    expect(router.state.location.pathname).toBe('/caring');
    expect(screen.queryByText(/Wendell/)).toBeNull();
    expect(queryClient.getQueryData(['today'])).toBeUndefined();
  });

  it('moves nobody on to the next person without being asked', async () => {
    signedIn(marta([ines, wendell]));
    const { queryClient } = await show('/caring');
    await user.click(await screen.findByRole('button', { name: 'Ines Valcourt' }));
    await screen.findByText('Page of Ines Valcourt, day 24');
    me = { ...me, caresFor: [wendell] };
    await act(() => queryClient.refetchQueries(sessionQuery));
    expect(await screen.findByText('You no longer look after this person here')).toBeDefined();
    expect(screen.getByRole('button', { name: 'Wendell Osei' })).toBeDefined();
  });

  it('is noticed at the first answer that finds nothing, also where no hint came through', async () => {
    const person = marta([wendell]);
    signedIn(person, {
      'GET /api/today': () => {
        me = { ...person, caresFor: [] };
        return new Problem('not-found');
      },
    });
    await show();
    expect(await screen.findByText('You no longer look after this person here')).toBeDefined();
  });

  it('does not take a caution away from whoever is told to call', async () => {
    signedIn(marta([wendell]));
    const { queryClient } = await show('/today', <Held />);
    await screen.findByText('Call 911 now');
    me = { ...me, caresFor: [] };
    await act(() => queryClient.refetchQueries(sessionQuery));
    expect(screen.getByText('Call 911 now')).toBeDefined();
  });
});
