import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import type { StaffPerson } from '#shared/people/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { PersonPage } from '#src/pages/PersonPage.tsx';
import { serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { act, ada, admin, noor } from './staff.ts';

const user = userEvent.setup({ delay: null });

async function show(personId: string, people: StaffPerson[], others: Record<string, Answer> = {}) {
  const sent = serve({
    'GET /api/people': () => ({ people }),
    'GET /api/two-person-acts': () => ({ acts: [] }),
    ...others,
  });
  await showTo(admin, <PersonPage />, {
    at: `/clinic/people/${personId}`,
    path: '/clinic/people/:personId',
  });
  const region = async (name: string) => within(await screen.findByRole('region', { name }));
  return { sent, roles: await region('Roles'), access: await region('Access') };
}

describe('roles', () => {
  it('says that a guarded role takes a second person, and asks why before anything is sent', async () => {
    const { sent, roles } = await show(noor.id, [ada, noor], {
      [`POST /api/people/${noor.id}/roles`]: () => ({ ...noor, waiting: [act] }),
    });
    await user.click(roles.getByRole('button', { name: 'Give Administrator' }));
    const dialog = within(await screen.findByRole('dialog'));
    expect(dialog.getByText(/a second person must confirm/u)).toBeTruthy();
    await user.click(dialog.getByRole('button', { name: 'Ask a second person' }));
    expect(await dialog.findByText('Say why, in a few words.')).toBeTruthy();
    expect(sent.some(({ method }) => method === 'POST')).toBe(false);

    await user.type(dialog.getByLabelText('Why?'), 'Runs the office');
    await user.click(dialog.getByRole('button', { name: 'Ask a second person' }));
    expect(await screen.findByText('Administrator waits for a second person.')).toBeTruthy();
    expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({
      role: 'administrator',
      reason: 'Runs the office',
    });
  });

  it('does not offer what waits already, nor a lead’s role to somebody who treats nobody', async () => {
    const { roles } = await show(noor.id, [ada, { ...noor, roles: ['billing'], waiting: [act] }]);
    expect(roles.getByText(/Administrator · waits for a second person/u)).toBeTruthy();
    expect(roles.queryByRole('button', { name: 'Give Administrator' })).toBeNull();
    expect(roles.queryByRole('button', { name: 'Give Clinical lead' })).toBeNull();
    expect(roles.queryByRole('button', { name: 'Remove Billing' })).toBeNull();
  });

  it('shows what the server refuses in its own words, and keeps what was typed', async () => {
    const { roles } = await show(noor.id, [ada, noor], {
      [`POST /api/people/${noor.id}/roles`]: () =>
        new Problem('state-conflict', 'This waits for a second person already.'),
    });
    await user.click(roles.getByRole('button', { name: 'Give Billing' }));
    const dialog = within(await screen.findByRole('dialog'));
    await user.type(dialog.getByLabelText('Why?'), 'Does the books');
    await user.click(dialog.getByRole('button', { name: 'Give the role' }));
    expect(await dialog.findByText('This waits for a second person already.')).toBeTruthy();
    expect(dialog.getByLabelText<HTMLTextAreaElement>('Why?').value).toBe('Does the books');
  });
});

describe('access', () => {
  it('offers nobody to end their own access, nor the last administrator’s', async () => {
    const { access, roles } = await show(ada.id, [ada, noor]);
    expect(access.queryByRole('button', { name: 'Deactivate' })).toBeNull();
    expect(access.getByText('You cannot end your own access. Ask another administrator.')).toBeTruthy();
    expect(roles.queryByRole('button', { name: 'Remove Administrator' })).toBeNull();
    expect(roles.getByText(/The last administrator stays one/u)).toBeTruthy();
  });

  it('ends somebody else’s access with a reason, after it has said what follows', async () => {
    const { sent, access } = await show(noor.id, [ada, noor], {
      [`POST /api/people/${noor.id}/deactivation`]: () => ({ ...noor, active: false }),
    });
    await user.click(access.getByRole('button', { name: 'Deactivate' }));
    const dialog = within(await screen.findByRole('dialog'));
    expect(dialog.getByText(/Signed out at once on every device/u)).toBeTruthy();
    await user.type(dialog.getByLabelText('Why?'), 'Has left the clinic');
    await user.click(dialog.getByRole('button', { name: 'Deactivate' }));
    expect(await screen.findByText('Access has ended, on every device.')).toBeTruthy();
    expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ reason: 'Has left the clinic' });
  });

  it('lets somebody in again, and gives no roles meanwhile', async () => {
    const { access, roles } = await show(noor.id, [ada, { ...noor, active: false }]);
    expect(access.getByRole('button', { name: 'Let in again' })).toBeTruthy();
    expect(roles.queryAllByRole('button')).toEqual([]);
  });
});
