import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { PatientRecordPage } from '#src/pages/PatientRecordPage.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { line, openInvitation, record } from './records.ts';

const user = userEvent.setup({ delay: null });
const place = `/api/patients/${record.id}`;

async function show(answer: Answer, others: Record<string, Answer> = {}) {
  const sent = serve({ [`GET ${place}`]: answer, ...others });
  const shown = await showTo(noorSignedIn, <PatientRecordPage />, {
    at: `/caseload/${record.id}`,
    path: '/caseload/:patientId',
  });
  return { ...shown, sent };
}
const state = () => screen.findByRole('region', { name: 'State' });
const movesOf = async () =>
  within(await state())
    .queryAllByRole('button')
    .map((button) => button.textContent);

it.each([
  [
    ['pause', 'discharge', 'end'],
    ['Pause', 'Discharge', 'End'],
  ],
  [
    ['resume', 'discharge', 'end'],
    ['Resume', 'Discharge', 'End'],
  ],
  [
    ['take-back', 'end'],
    ['Take back', 'End'],
  ],
  [[], []],
] as const)('offers the moves that there are and no others: %j', async (moves, buttons) => {
  await show(() => ({ ...record, moves }));
  expect(await movesOf()).toEqual(buttons);
});

it('asks for reason and date of a pause, says what follows, and says that it was kept', async () => {
  const paused: PatientRecord = { ...record, state: 'paused', backOn: '2026-12-12', moves: ['resume'] };
  let now = record;
  const { sent } = await show(() => now, {
    [`POST ${place}/moves`]: () => {
      now = paused;
      return paused;
    },
  });
  await user.click(within(await state()).getByRole('button', { name: 'Pause' }));
  const dialog = await screen.findByRole('dialog', { name: 'Pause: Tobias Ahlgren' });
  expect(dialog.textContent).toContain('No reminders while paused');

  await user.click(within(dialog).getByRole('button', { name: 'Pause' }));
  expect(await within(dialog).findByText('Say why, in a few words.')).toBeTruthy();
  expect(sent.filter(({ method }) => method === 'POST')).toEqual([]);

  await user.type(within(dialog).getByLabelText('Expected back on'), '2026-12-12');
  await user.type(within(dialog).getByLabelText('Why? For example: in hospital, away.'), 'Visits her sister');
  await user.click(within(dialog).getByRole('button', { name: 'Pause' }));
  expect(await screen.findByText('Paused.')).toBeTruthy();
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({
    move: 'pause',
    reason: 'Visits her sister',
    backOn: '2026-12-12',
  });
  await waitFor(async () => expect(await movesOf()).toEqual(['Resume']));
});

it('says before a discharge that the clinic no longer watches, and how many flags are open', async () => {
  await show(() => ({ ...record, openFlags: 2 }));
  await user.click(within(await state()).getByRole('button', { name: 'Discharge' }));
  const dialog = await screen.findByRole('dialog');
  expect(dialog.textContent).toContain('that the clinic no longer watches. Threads close');
  expect(dialog.textContent).toContain('2 flags are still open.');
});

it('keeps the reason that was typed when the move is refused', async () => {
  await show(() => record, {
    [`POST ${place}/moves`]: () => new Problem('state-conflict', 'A colleague has paused this patient.'),
  });
  await user.click(within(await state()).getByRole('button', { name: 'Pause' }));
  const dialog = await screen.findByRole('dialog');
  const reason = within(dialog).getByLabelText<HTMLTextAreaElement>('Why? For example: in hospital, away.');
  await user.type(reason, 'In hospital');
  await user.click(within(dialog).getByRole('button', { name: 'Pause' }));
  expect(await within(dialog).findByText('A colleague has paused this patient.')).toBeTruthy();
  expect(reason.value).toBe('In hospital');
});

it('asks somebody outside the care team why, shows nothing before, and then opens the record', async () => {
  let reasonGiven = false;
  const { sent } = await show(() => (reasonGiven ? record : new Problem('reason-needed')), {
    [`POST ${place}/openings`]: () => {
      reasonGiven = true;
      return undefined;
    },
  });
  const reason = await screen.findByLabelText('Why do you open this chart?');
  expect(screen.getByText(/The patient reads this/u)).toBeTruthy();
  expect(screen.queryByText(/Tobias/u)).toBeNull();

  await user.click(screen.getByRole('button', { name: 'Open the chart' }));
  expect(await screen.findByText('Say why, in a few words.')).toBeTruthy();
  await user.type(reason, 'Covers for Noor today');
  await user.click(screen.getByRole('button', { name: 'Open the chart' }));
  expect(await screen.findByRole('heading', { name: /Tobias Ahlgren, 69/u })).toBeTruthy();
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ reason: 'Covers for Noor today' });
});

it('says at the head that nobody has asked about a blood thinner', async () => {
  await show(() => record);
  const facts = await screen.findByRole('region', { name: 'Safety facts' });
  expect(facts.textContent).toContain('Blood thinner: not recorded, so ask.');
});

it('offers the code for the patient’s own phone while the invitation is open, and never a secret', async () => {
  await show(() => record);
  const way = await screen.findByRole('region', { name: 'Way in' });
  const link = within(way).getByRole('link', { name: 'Set up on their phone here' });
  expect(link.getAttribute('href')).toBe(`/letters/${openInvitation.id}/phone`);
  expect(way.textContent).toContain('Invited 2 Dec, not come yet');
});

it('does not let a caregiver in without the patient’s recorded consent', async () => {
  const { sent } = await show(() => record, {
    [`POST ${place}/caregivers`]: () => {
      throw new Error('It must not be sent.');
    },
  });
  await user.click(await screen.findByRole('button', { name: 'Invite a caregiver' }));
  const dialog = await screen.findByRole('dialog', { name: 'Invite a caregiver' });
  await user.type(within(dialog).getByLabelText('Name'), 'Karin Ahlgren');
  await user.click(within(dialog).getByRole('button', { name: 'Invite' }));
  expect(await within(dialog).findByText('Say how and when the patient agreed.')).toBeTruthy();
  expect(within(dialog).getByText('Choose how they are invited.')).toBeTruthy();
  expect(within(dialog).getByLabelText<HTMLInputElement>('Name').value).toBe('Karin Ahlgren');
  expect(sent.every(({ method }) => method === 'GET')).toBe(true);
});

it('says of a caregiver who has an account that they were told, and offers no letter', async () => {
  const caregiver = {
    id: '3f0c3c06-5a0b-4f51-8a3f-0a8c3b2d7a01',
    name: 'Karin Ahlgren',
    email: 'karin.ahlgren@mail.example',
    relationship: 'sister',
    mayCheckIn: true,
    mayMessage: false,
    until: null,
    grantedBy: 'Noor Haddad',
    byClinic: true,
    consent: 'Said so at the visit.',
    createdAt: '2026-12-02T15:00:00.000Z',
    endedAt: null,
    firstOpenedAt: null,
    invitation: null,
  };
  await show(() => ({ ...record, caregivers: [caregiver] }));
  const section = await screen.findByRole('region', { name: 'Caregivers' });
  expect(section.textContent).toContain('Told by e-mail 2 Dec 2026, has not looked yet');
  expect(within(section).queryByRole('link', { name: 'Letter' })).toBeNull();
});

it('shows an ended record with nothing left to do', async () => {
  await show(() => ({ ...record, ...line, state: 'ended', moves: [], invitation: null }));
  expect(await movesOf()).toEqual([]);
  expect(screen.queryByRole('link', { name: 'Change the record' })).toBeNull();
  expect(screen.queryByRole('button', { name: /Invite/u })).toBeNull();
});
