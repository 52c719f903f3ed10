import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { consequences, patientStates } from '#shared/patients/states.ts';
import type { Today } from '#shared/plans/contract.ts';
import { mayCheckIn } from '#src/app/caring.ts';
import { RequireMessages } from '#src/app/RequireMessages.tsx';
import { RequireRecord } from '#src/app/RequireRecord.tsx';
import { armCalls, MeContext, sessionQuery } from '#src/app/session.tsx';
import { PatientShell } from '#src/app/shells/PatientShell.tsx';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { CheckInPage } from '#src/pages/CheckInPage.tsx';
import { MessagesPage } from '#src/pages/MessagesPage.tsx';
import { NewMessagePage } from '#src/pages/NewMessagePage.tsx';
import { TodayPage } from '#src/pages/TodayPage.tsx';
import { inesContext } from '../check-ins/drafts.ts';
import { serve } from '../clinic/screen.tsx';
import { ines, inesHerself, marta } from './caring-people.ts';

const today: Today = {
  firstName: 'Ines',
  date: '2026-12-01',
  day: 24,
  arm: 'left',
  therapist: 'Noor',
  surgeon: 'Dr. Mbeki-Stone',
  surgeryDate: '2026-11-07',
  phase: { code: 'protect', usualEndDate: '2026-12-19' },
  trellis: {
    arm: 'left',
    today: 24,
    phases: [{ code: 'protect', name: 'Protect', openedOnDay: 0, usualStartDay: 0, usualEndDay: 42 }],
    days: [],
    review: null,
  },
  checkIns: { done: 20, of: 23, todayAt: null },
  holdOff: [],
  exercises: [],
  paused: null,
  openFlag: null,
  unseenMessages: 0,
};

async function show(me: Me, at = '/today', part: Partial<Today> = {}) {
  await startI18n();
  await loadWords(['today', 'plan', 'messages', 'threads', 'record']);
  serve({
    'GET /api/today': () => ({ ...today, ...part }),
    'GET /api/check-in-context': () => inesContext,
    'GET /api/threads': () => ({ threads: [] }),
  });
  const queryClient = createQueryClient();
  queryClient.setQueryData(sessionQuery.queryKey, { me });
  armCalls(me);
  const router = createMemoryRouter(
    [
      {
        element: <RequireRecord />,
        children: [
          {
            element: <PatientShell />,
            children: [
              { path: '/today', element: <TodayPage /> },
              {
                element: <RequireMessages />,
                children: [
                  { path: '/messages', element: <MessagesPage /> },
                  { path: '/messages/new', element: <NewMessagePage /> },
                ],
              },
            ],
          },
          { path: '/check-in', element: <CheckInPage /> },
        ],
      },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <MeContext value={me}>
        <RouterProvider router={router} />
      </MeContext>
    </QueryClientProvider>,
  );
  await screen.findByRole('heading', { level: 1 });
  return router;
}

const checkIn = () => screen.queryByRole('link', { name: /check-in/ });

beforeEach(() => sessionStorage.clear());

describe('where the record stands', () => {
  it('under way: there is a check-in, and no further word', async () => {
    await show(inesHerself());
    expect(await screen.findByRole('link', { name: 'Start today’s check-in' })).toBeDefined();
    expect(screen.queryByText(/Paused|no longer watches|Your surgery is on/)).toBeNull();
  });

  it('before surgery: says when it is, offers a message, and neither a check-in nor anything to hold off from', async () => {
    await show(inesHerself({ state: 'planned' }), '/today', { day: -6, surgeryDate: '2026-12-07' });
    expect(await screen.findByText('Your surgery is on Monday 7 Dec')).toBeDefined();
    expect(screen.getByRole('link', { name: 'Write a message' }).getAttribute('href')).toBe('/messages/new');
    expect(checkIn()).toBeNull();
    expect(screen.queryByRole('heading', { name: /Hold off/ })).toBeNull();
    expect(screen.queryByText(/-6/)).toBeNull();
  });

  it('paused: says since when, and the check-in is there all the same', async () => {
    await show(inesHerself({ state: 'paused', stateSince: '2026-11-28T15:00:00.000Z' }));
    expect(await screen.findByText('Paused since 28 Nov')).toBeDefined();
    expect(screen.getByText(/We send no reminders now/)).toBeDefined();
    expect(checkIn()).not.toBeNull();
  });

  it('discharged: says since when nobody watches and whom to call, with no check-in', async () => {
    const me = inesHerself({ state: 'discharged', stateSince: '2026-11-28T15:00:00.000Z' });
    await show(me);
    expect(await screen.findByText('The clinic no longer watches this record')).toBeDefined();
    expect(screen.getByText(/Since 28 Nov, nobody at the clinic reads/)).toBeDefined();
    expect(screen.getByRole('link', { name: 'Call the clinic: 555-0100' }).getAttribute('href')).toBe(
      'tel:5550100',
    );
    expect(checkIn()).toBeNull();
  });

  it('discharged: messages can be read and not written', async () => {
    const router = await show(inesHerself({ state: 'discharged' }), '/messages/new');
    expect(router.state.location.pathname).toBe('/messages');
    expect(screen.queryByRole('link', { name: 'New message' })).toBeNull();
  });

  it.each(['planned', 'discharged'] as const)(
    '%s: the address of the check-in leads to Today',
    async (state) => {
      const router = await show(inesHerself({ state }), '/check-in');
      expect(router.state.location.pathname).toBe('/today');
    },
  );
});

it('a check-in is offered in just the states that the table of states names', () => {
  for (const state of patientStates) {
    expect([state, mayCheckIn({ ...ines, state, caring: null })]).toEqual([
      state,
      consequences[state].checkIns,
    ]);
  }
});

describe('what somebody who looks after the patient may do', () => {
  it('is everything of the day where the patient wants it so; they are greeted by their own name', async () => {
    await show(marta([ines]));
    expect(await screen.findByRole('heading', { level: 1, name: /Marta$/ })).toBeDefined();
    expect(screen.getByText('For Ines Valcourt')).toBeDefined();
    expect(checkIn()).not.toBeNull();
    expect(screen.getAllByRole('link', { name: /Messages/ }).length).toBeGreaterThan(0);
  });

  it('is told on Today, and what they may not do is not offered', async () => {
    await show(marta([{ ...ines, mayCheckIn: false, mayMessage: false }]));
    expect(
      await screen.findByText(/Ines Valcourt fills in the check-in and writes the messages/),
    ).toBeDefined();
    expect(checkIn()).toBeNull();
    expect(screen.queryByRole('link', { name: /Messages/ })).toBeNull();
  });

  it.each(['/messages', '/messages/new', '/check-in'])(
    'does not open by its address: %s',
    async (address) => {
      const router = await show(marta([{ ...ines, mayCheckIn: false, mayMessage: false }]), address);
      expect(router.state.location.pathname).toBe('/today');
    },
  );
});
