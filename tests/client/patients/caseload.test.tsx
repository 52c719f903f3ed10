import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, expect, it, vi } from 'vitest';
import type { PatientLine } from '#shared/patients/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { ToastProvider } from '#src/components/Toast.tsx';
import { comingWords } from '#src/lib/invitation-words.ts';
import { clearDeviceStore } from '#src/lib/device-store.ts';
import { CaseloadPage } from '#src/pages/CaseloadPage.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { line, openInvitation } from './records.ts';

const user = userEvent.setup({ delay: null });
beforeEach(() => clearDeviceStore());

const administrator = { ...noorSignedIn, roles: ['administrator' as const] };

async function show(list: Answer, { me = noorSignedIn, at = '/caseload', others = {} } = {}) {
  const sent = serve({ 'GET /api/patients': list, ...others });
  const fetched = vi.spyOn(globalThis, 'fetch');
  const addresses = () => fetched.mock.calls.map(([address]) => address as string);
  const page = (
    <ToastProvider label="News" closeLabel="Close">
      <CaseloadPage />
    </ToastProvider>
  );
  return { ...(await showTo(me, page, { at })), sent, addresses };
}
const searchBox = () => screen.getByLabelText<HTMLInputElement>('Name or chart number');
const listOf = (patients: PatientLine[], neverStarted = 0) => ({ patients, neverStarted });

it('shows fifty patients with state, day, lead and how far they have come', async () => {
  const patients = Array.from({ length: 50 }, (_, index) => ({
    ...line,
    id: `1f2e3d4c-5b6a-4978-8c6d-7e8f9a0b1c${String(index + 10)}`,
    name: `Wilhelmina-Alexandra Featherstonehaugh-Cholmondeley ${index}`,
  }));
  await show(() => listOf(patients, 3));
  const rows = await screen.findAllByRole('row');
  expect(rows).toHaveLength(51);
  expect(rows[1]?.textContent).toContain('Day 12');
  expect(rows[1]?.textContent).toContain('Invited 2 Dec, not come yet');
  expect(screen.getByText('50 patients')).toBeTruthy();
  expect(screen.getByRole('link', { name: 'Never started (3)' })).toBeTruthy();
});

it('gives administrators names and states without a way into a record, and the invitation in a menu', async () => {
  const { sent } = await show(() => listOf([line]), {
    me: administrator,
    others: { [`POST /api/patients/${line.id}/invitations`]: () => openInvitation },
  });
  await screen.findByText(line.name);
  expect(screen.queryByRole('link', { name: line.name })).toBeNull();
  expect(screen.queryByRole('link', { name: 'Enrol a patient' })).toBeNull();
  expect(screen.queryByRole('link', { name: 'Mine' })).toBeNull();
  await user.click(screen.getByRole('button', { name: `Invitation of ${line.name}` }));
  await user.click(await screen.findByRole('menuitem', { name: 'Send a new one by e-mail' }));
  expect(await screen.findByText(`A new invitation is on its way to ${line.name}.`)).toBeTruthy();
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ byEmail: true });
});

it('keeps the filter in the address', async () => {
  const { router } = await show(() => listOf([line], 1), { at: '/caseload?show=paused' });
  const paused = await screen.findByRole('link', { name: 'Paused' });
  expect(paused.getAttribute('aria-current')).toBe('page');
  await user.click(await screen.findByRole('link', { name: 'Never started (1)' }));
  expect(router.state.location.search).toBe('?show=never-started');
  await user.click(await screen.findByRole('link', { name: 'All' }));
  expect(router.state.location.search).toBe('');
});

const gudrun = { ...line, id: '2c3d4e5f-6a7b-4c8d-9e0f-1a2b3c4d5e6f', name: 'Guðrún Þórsdóttir' };

it('searches on the screen: typing a name makes no request and stands in no address', async () => {
  const { router, addresses } = await show(() => listOf([line, gudrun]), { at: '/caseload?show=mine' });
  await screen.findByText(gudrun.name);
  const entry = router.state.location;
  await user.type(searchBox(), 'thors');
  expect(screen.getByText('1 patient')).toBeTruthy();
  expect(screen.queryByText(line.name)).toBeNull();
  expect(screen.getByText(gudrun.name)).toBeTruthy();
  expect(router.state.location).toBe(entry);
  expect(addresses()).toEqual(['/api/patients?filter=mine']);

  await user.click(screen.getByRole('link', { name: 'All' }));
  await screen.findByText(gudrun.name);
  expect(searchBox().value).toBe('thors');
  // The whole entry of the history, with its state, which outlives a sign-out.
  expect(JSON.stringify(router.state.location)).not.toContain('thors');
  expect(addresses()).toEqual(['/api/patients?filter=mine', '/api/patients?filter=all']);
});

it('still shows what was searched for on the way back from a record, to nobody else, until sign-out', async () => {
  const first = await show(() => listOf([line, gudrun]));
  await user.type(searchBox(), 'thors');
  first.unmount();
  const second = await show(() => listOf([line, gudrun]));
  await screen.findByText(gudrun.name);
  expect(searchBox().value).toBe('thors');
  expect(screen.queryByText(line.name)).toBeNull();
  second.unmount();
  const colleague = { ...noorSignedIn, personId: '5b1f7c22-9d3e-4f6a-8b1c-2d3e4f5a6b7c' };
  const third = await show(() => listOf([line, gudrun]), { me: colleague });
  await screen.findByText(line.name);
  expect(searchBox().value).toBe('');
  third.unmount();
  clearDeviceStore();
  await show(() => listOf([line, gudrun]));
  await screen.findByText(line.name);
  expect(searchBox().value).toBe('');
});

it('says that nobody is paused, and that a name was not found, in different words', async () => {
  await show(() => listOf([]), { at: '/caseload?show=paused' });
  expect(await screen.findByText('Nobody is paused.')).toBeTruthy();
  await user.type(searchBox(), 'Zz');
  expect(await screen.findByText('Nobody has that name or chart number here.')).toBeTruthy();
});

it('says that the list could not be loaded, and tries again', async () => {
  const answers: unknown[] = [new Problem('forbidden'), listOf([line])];
  await show(() => answers.shift());
  await user.click(await screen.findByRole('button', { name: 'Try again' }));
  expect(within(await screen.findByRole('table')).getByText(line.name)).toBeTruthy();
});

const nowMs = Date.parse('2026-12-20T12:00:00Z');
const words = (changes: Partial<PatientLine>) =>
  comingWords({ ...line, ...changes }, nowMs, 'America/New_York');

it('says how far somebody has come in the words of the list', () => {
  expect(words({})).toBe('Invited 2 Dec, not come yet');
  expect(words({ invitation: null })).toBe('Not invited yet');
  expect(words({ invitation: { ...openInvitation, expiresAt: '2026-12-16T15:00:00.000Z' } })).toBe(
    'Invitation ran out 16 Dec',
  );
  expect(words({ invitation: { ...openInvitation, askedAgainAt: '2026-12-18T15:00:00.000Z' } })).toBe(
    'Asked for a new invitation 18 Dec',
  );
  expect(words({ firstSignedInAt: '2026-12-03T15:00:00.000Z' })).toBe('Signed in, no check-in yet');
  expect(
    words({ firstSignedInAt: '2026-12-03T15:00:00.000Z', firstCheckInAt: '2026-12-03T15:10:00.000Z' }),
  ).toBeNull();
});
