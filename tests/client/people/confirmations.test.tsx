import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import type { TwoPersonAct } from '#shared/people/contract.ts';
import { TwoPersonActsPage } from '#src/pages/TwoPersonActsPage.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import { act, admin } from './staff.ts';

const user = userEvent.setup({ delay: null });
const lead = {
  ...noorSignedIn,
  personId: '4d5e6f7a-8b9c-4d0e-8f1a-2b3c4d5e6f7a',
  roles: ['therapist' as const, 'clinical-lead' as const],
};

async function show(me: typeof lead | typeof admin, acts: TwoPersonAct[]) {
  const sent = serve({
    'GET /api/two-person-acts': () => ({ acts }),
    [`POST /api/two-person-acts/${act.id}/decision`]: () => ({ ...act, state: 'confirmed' }),
  });
  await showTo(me, <TwoPersonActsPage />, { at: '/clinic/confirmations' });
  return sent;
}

it('lets nobody confirm what they asked for themselves: they may withdraw it', async () => {
  const sent = await show(admin, [act]);
  expect(await screen.findByText('You asked for this, so another person decides.')).toBeTruthy();
  expect(screen.queryByRole('button', { name: 'Confirm' })).toBeNull();
  expect(screen.queryByRole('button', { name: 'Refuse' })).toBeNull();
  await user.click(screen.getByRole('button', { name: 'Withdraw' }));
  expect(await screen.findByText('Withdrawn. Nothing has changed.')).toBeTruthy();
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ decision: 'withdraw' });
});

it('lets nobody decide about themselves', async () => {
  await show({ ...lead, personId: act.person.id }, [act]);
  expect(await screen.findByText('This is about you, so another person decides.')).toBeTruthy();
  expect(screen.queryAllByRole('button')).toEqual([]);
});

it('shows the second person who, what and why, and takes their answer', async () => {
  const sent = await show(lead, [act]);
  expect(await screen.findByText('Noor Haddad: Give the role Administrator')).toBeTruthy();
  expect(screen.getByText(`“${act.reason}”`)).toBeTruthy();
  await user.click(screen.getByRole('button', { name: 'Confirm' }));
  expect(await screen.findByText('Confirmed. It holds now.')).toBeTruthy();
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ decision: 'confirm' });
});

it('says that nothing waits, and keeps what was decided below', async () => {
  await show(lead, [
    { ...act, state: 'refused', decidedBy: 'Petra Lindqvist', decidedAt: '2026-12-01T10:00:00.000Z' },
  ]);
  expect(await screen.findByText('Nothing waits for a second person.')).toBeTruthy();
  expect(screen.getByText('Refused')).toBeTruthy();
  expect(screen.queryAllByRole('button')).toEqual([]);
});
