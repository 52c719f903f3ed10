import { screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { PatientMenu } from '#src/app/shells/PatientMenu.tsx';
import { keptNames, storeOf } from '#src/features/check-ins/kept.ts';
import { keepOnDevice } from '#src/lib/device-store.ts';
import { lost, noorSignedIn, serve, showTo } from '../clinic/screen.tsx';

const user = userEvent.setup({ delay: null });
const ines: Me = {
  ...noorSignedIn,
  name: 'Ines Valcourt',
  roles: ['patient'],
  patient: { id: 'record-of-ines', arm: 'left', controlsTowards: 'right', state: 'active', stateSince: null },
};

it('asks before a sign-out that loses an unsent check-in, stays until it is answered, and then signs out', async () => {
  const sent = serve({ 'DELETE /api/session': () => lost });
  keepOnDevice(storeOf(ines, null), keptNames.draft.full, { date: '2026-12-01' });
  await showTo(ines, <PatientMenu />);
  await user.click(screen.getByRole('button', { name: 'Your account: Ines Valcourt' }));
  await user.click(await screen.findByRole('button', { name: 'Sign out' }));
  const dialog = await screen.findByRole('alertdialog', { name: 'Your check-in is not sent' });
  // The focus is in the question now, outside the menu, which has folded.
  await waitFor(() => expect(dialog.contains(document.activeElement)).toBe(true));
  expect(screen.queryByText('Sign out')).toBeNull();
  expect(sent).toEqual([]);
  await user.click(screen.getByRole('button', { name: 'Stay' }));
  const account = screen.getByRole('button', { name: 'Your account: Ines Valcourt' });
  await waitFor(() => expect(document.activeElement).toBe(account));
  if (account.getAttribute('aria-expanded') !== 'true') await user.click(account);
  await user.click(await screen.findByRole('button', { name: 'Sign out' }));
  await screen.findByRole('alertdialog', { name: 'Your check-in is not sent' });
  await user.click(screen.getByRole('button', { name: 'Discard it and sign out' }));
  expect(await screen.findByText(/You are not signed out yet/)).toBeDefined();
  expect(sent.map(({ path }) => path)).toEqual(['/api/session']);
});
