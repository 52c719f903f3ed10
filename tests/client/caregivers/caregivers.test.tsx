import { screen, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, describe, expect, it } from 'vitest';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { CaregiversPage } from '#src/pages/CaregiversPage.tsx';
import { ines, inesHerself, marta } from '../app/caring-people.ts';
import { serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';

const user = userEvent.setup({ delay: null });

const card = (part: Partial<CaregiverCard> = {}): CaregiverCard => ({
  id: '3f0c3c06-5a0b-4f51-8a3f-0a8c3b2d7a01',
  name: 'Marta Valcourt',
  email: 'marta.valcourt@mail.example',
  relationship: 'my daughter',
  mayCheckIn: true,
  mayMessage: false,
  until: null,
  grantedBy: 'Ines Valcourt',
  byClinic: false,
  consent: null,
  createdAt: '2026-11-20T09:00:00.000Z',
  endedAt: null,
  firstOpenedAt: '2026-11-20T10:00:00.000Z',
  ...part,
});

async function show(caregivers: CaregiverCard[], routes: Record<string, Answer> = {}, me = inesHerself()) {
  await startI18n();
  await loadWords(['account', 'caregivers']);
  const sent = serve({ 'GET /api/caregivers': () => ({ caregivers }), ...routes });
  const { router } = await showTo(me, <CaregiversPage />, { at: '/account/caregivers', path: '/account/*' });
  return { sent, router };
}

const press = (name: string | RegExp) => user.click(screen.getByRole('button', { name }));

beforeEach(() => sessionStorage.clear());

describe('the people who help a patient', () => {
  it('stand with what they may do, until when, and whether they are there', async () => {
    await show([
      card({ until: '2026-12-24' }),
      card({
        id: 'b',
        name: 'Piet',
        mayMessage: true,
        mayCheckIn: false,
        firstOpenedAt: null,
        endedAt: '2026-11-25T09:00:00.000Z',
      }),
    ]);
    const now = await screen.findByRole('region', { name: 'They help you now' });
    expect(now.textContent).toContain('Marta Valcourt');
    expect(now.textContent).toContain('Active');
    expect(now.textContent).toContain('May fill in check-ins. May not see messages. Until 24 Dec.');
    const past = screen.getByRole('region', { name: 'They no longer help you' });
    expect(past.textContent).toContain('Ended on 25 Nov.');
    expect(within(past).queryByRole('button')).toBeNull();
  });

  it('who have not looked yet stand with when they were invited, and until when that is good', async () => {
    await show([card({ firstOpenedAt: null })]);
    const now = await screen.findByRole('region', { name: 'They help you now' });
    expect(now.textContent).toContain('Invited, not here yet');
    expect(now.textContent).toContain('Invited on 20 Nov. The invitation is good until 4 Dec.');
  });

  it('are ended at once, after one question', async () => {
    const ended = card({ endedAt: '2026-12-01T09:00:00.000Z' });
    let list = [card()];
    const { sent } = await show(list, {
      'GET /api/caregivers': () => ({ caregivers: list }),
      [`DELETE /api/caregivers/${ended.id}`]: () => {
        list = [ended];
        return ended;
      },
    });
    await screen.findByText('Marta Valcourt');
    await press('End the help of Marta Valcourt');
    const dialog = await screen.findByRole('alertdialog', { name: 'End the help of Marta Valcourt?' });
    expect(sent.some(({ method }) => method === 'DELETE')).toBe(false);
    await user.click(within(dialog).getByRole('button', { name: 'End it now' }));
    expect(await screen.findByText(/Ended on/)).toBeDefined();
    expect(screen.queryByRole('alertdialog')).toBeNull();
  });

  it('are not the business of somebody who looks after the patient', async () => {
    const { sent, router } = await show([], {}, marta([ines]));
    expect(router.state.location.pathname).toBe('/account');
    expect(screen.queryByRole('heading', { name: 'People who help me' })).toBeNull();
    expect(sent).toEqual([]);
  });
});

describe('an invitation', () => {
  it('has nothing chosen beforehand, and says beside each field what is missing', async () => {
    const { sent } = await show([]);
    await screen.findByText('Nobody helps you here yet');
    await press('Invite someone');
    await screen.findByRole('heading', { name: 'Invite someone to help' });
    for (const box of screen.getAllByRole('checkbox')) expect(box).toHaveProperty('checked', false);
    for (const radio of screen.getAllByRole('radio')) expect(radio).toHaveProperty('checked', false);
    await press('Send the invitation');
    expect(await screen.findByText('Enter a name.')).toBeDefined();
    expect(screen.getByText('Enter an e-mail address.')).toBeDefined();
    expect(screen.getByText('Choose one of the two.')).toBeDefined();
    expect(sent.some(({ method }) => method === 'POST')).toBe(false);
  });

  it('goes out with what was chosen, and the server’s refusal of one’s own address stands at the field', async () => {
    let refused = true;
    const { sent } = await show([], {
      'POST /api/caregivers': () => {
        if (!refused) return card({ firstOpenedAt: null });
        return new Problem('invalid-input', undefined, {
          errors: [{ field: 'email', message: 'This is your own address.' }],
        });
      },
    });
    await screen.findByText('Nobody helps you here yet');
    await press('Invite someone');
    await user.type(await screen.findByLabelText('Their name'), 'Marta Valcourt');
    await user.type(screen.getByLabelText('Their e-mail'), 'ines.valcourt@mail.example');
    await user.type(screen.getByLabelText('Who they are to you'), 'my daughter');
    await user.click(screen.getByRole('checkbox', { name: 'Fill in check-ins for me' }));
    await user.click(screen.getByRole('radio', { name: /As long as I want it/ }));
    await press('Send the invitation');
    expect(await screen.findByText('This is your own address.')).toBeDefined();
    expect(screen.getByLabelText('Their name')).toHaveProperty('value', 'Marta Valcourt');
    refused = false;
    await user.clear(screen.getByLabelText('Their e-mail'));
    await user.type(screen.getByLabelText('Their e-mail'), 'marta.valcourt@mail.example');
    await press('Send the invitation');
    expect(await screen.findByText('The invitation to Marta Valcourt is on its way.')).toBeDefined();
    const [first, second] = sent.filter(({ method }) => method === 'POST').map(({ body }) => body);
    expect(second).toEqual({
      id: (first as { id: string }).id,
      name: 'Marta Valcourt',
      email: 'marta.valcourt@mail.example',
      relationship: 'my daughter',
      mayCheckIn: true,
      mayMessage: false,
      until: null,
    });
  });
});

it('a change is sent with the last day, which has to be there once it was asked for', async () => {
  const changed = card({ mayMessage: true, until: '2026-12-24' });
  const { sent } = await show([card()], { [`PUT /api/caregivers/${changed.id}`]: () => changed });
  await screen.findByText('Marta Valcourt');
  await press('Change what Marta Valcourt may do');
  await user.click(await screen.findByRole('checkbox', { name: /Read and write messages/ }));
  await user.click(screen.getByRole('radio', { name: 'Until a day that I choose' }));
  await press('Save');
  expect(await screen.findByText('Enter the last day.')).toBeDefined();
  await user.type(screen.getByLabelText('The last day'), '2026-12-24');
  await press('Save');
  expect(await screen.findByText('Saved. It holds from now on.')).toBeDefined();
  expect(sent.find(({ method }) => method === 'PUT')?.body).toEqual({
    relationship: 'my daughter',
    mayCheckIn: true,
    mayMessage: true,
    until: '2026-12-24',
  });
});
