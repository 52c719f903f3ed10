import { screen, waitFor } from '@testing-library/react';
import { beforeEach, describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { clinic, lost, noorSignedIn } from '../clinic/screen.tsx';
import {
  alreadyHere,
  cancelled,
  enter,
  ines,
  press,
  question,
  user,
  withoutPasskeys,
  withPasskeys,
} from './entrance.tsx';

const invitation = { token: 'the-secret' };
const open = {
  state: 'open',
  kind: 'patient',
  clinic: { name: clinic.name, phone: clinic.phone, emergencyNumber: '911' },
  firstName: 'Ines',
  email: 'ines@valcourt.example',
  expiresAt: '2026-12-15T08:00:00.000Z',
};
const closed = (state: string) => ({ ...open, state, firstName: null, email: null });

const routes = {
  'POST /api/invitations/look': () => open,
  'POST /api/invitations/passkey-question': () => question,
  'POST /api/invitations/accept': () => ({ me: ines }),
};

beforeEach(() => {
  localStorage.clear();
  withPasskeys();
});

describe('an invitation', () => {
  it('leaves the address bar at once, and its secret travels in a body only', async () => {
    const { router, bodies } = await enter('/invitation#the-secret', routes);
    expect(await screen.findByText('Welcome, Ines')).toBeDefined();
    expect(router.state.location).toMatchObject({ pathname: '/invitation', hash: '', search: '' });
    expect(bodies('POST', '/api/invitations/look')).toEqual([{ invitation }]);
    expect(document.title).not.toContain('Ines');
  });

  it('is accepted by one press on “This is my own phone” and the passkey', async () => {
    const { bodies } = await enter('/invitation#the-secret', routes);
    await user.click(await screen.findByRole('button', { name: /This is my own phone/ }));
    expect(await screen.findByText('Today')).toBeDefined();
    expect(bodies('POST', '/api/invitations/accept')).toMatchObject([
      {
        invitation,
        staySignedIn: true,
        way: { kind: 'passkey', passkey: { challengeId: question.challengeId } },
      },
    ]);
  });

  it('makes no passkey on a device that others use, since whoever unlocks it would get in', async () => {
    const { bodies } = await enter('/invitation#the-secret', routes);
    await user.click(await screen.findByRole('button', { name: /Others use this device too/ }));
    expect(screen.getByRole<HTMLInputElement>('radio', { name: /Others use this device/ }).checked).toBe(
      true,
    );
    await user.type(screen.getByLabelText('Passphrase'), 'apple wire garden');
    await press('Done, take me in');
    expect(await screen.findByText('Today')).toBeDefined();
    expect(bodies('POST', '/api/invitations/accept')).toEqual([
      { invitation, staySignedIn: false, way: { kind: 'password', password: 'apple wire garden' } },
    ]);
  });

  it.each([
    ['closed the window', cancelled, /Nothing is lost/],
    ['has a passkey of hers here', alreadyHere, /This device has a passkey of yours/],
  ])('offers the passphrase to whoever %s, and keeps what she chose', async (_, create, said) => {
    withPasskeys({ create });
    const { bodies } = await enter('/invitation#the-secret', routes);
    await user.click(await screen.findByRole('button', { name: /This is my own phone/ }));
    expect(await screen.findByText(said)).toBeDefined();
    await press('Use a passphrase instead');
    expect(screen.getByRole<HTMLInputElement>('radio', { name: /This is my own phone/ }).checked).toBe(true);
    await user.type(screen.getByLabelText('Passphrase'), 'apple wire garden');
    await press('Done, take me in');
    expect(await screen.findByText('Today')).toBeDefined();
    expect(bodies('POST', '/api/invitations/accept')).toEqual([
      { invitation, staySignedIn: true, way: { kind: 'password', password: 'apple wire garden' } },
    ]);
  });

  it('asks for a passphrase where the browser has no passkeys, and says so before', async () => {
    withoutPasskeys();
    await enter('/invitation#the-secret', routes);
    expect(await screen.findByText(/you choose a few words/)).toBeDefined();
    await user.click(screen.getByRole('button', { name: /Others use this device/ }));
    expect(screen.getByLabelText('Passphrase')).toBeDefined();
    expect(document.activeElement?.textContent).toBe('Choose your passphrase');
  });

  it('tells everything that is missing at once, and chooses nothing for anybody', async () => {
    const { bodies } = await enter('/invitation#the-secret', routes);
    await screen.findByText('Welcome, Ines');
    await press('Use a passphrase instead');
    expect(screen.getAllByRole<HTMLInputElement>('radio').map(({ checked }) => checked)).toEqual([
      false,
      false,
    ]);
    await user.type(screen.getByLabelText('Passphrase'), 'short');
    expect(screen.getByText('Not yet: 5 of 15.')).toBeDefined();
    await press('Done, take me in');
    expect(await screen.findByText(/Use 15 characters or more/)).toBeDefined();
    expect(screen.getByText('Choose one of the two.')).toBeDefined();
    expect(bodies('POST', '/api/invitations/accept')).toEqual([]);
  });

  it('keeps the passphrase and says beside it why the server refuses it', async () => {
    await enter('/invitation#the-secret', {
      ...routes,
      'POST /api/invitations/accept': () =>
        new Problem('invalid-input', undefined, {
          errors: [{ field: 'password', message: 'Many people use these words. Choose others.' }],
        }),
    });
    await screen.findByText('Welcome, Ines');
    await press('Use a passphrase instead');
    await user.click(screen.getByRole('radio', { name: /This is my own phone/ }));
    const field = screen.getByLabelText<HTMLInputElement>('Passphrase');
    await user.type(field, 'password password');
    await press('Done, take me in');
    expect(await screen.findByText('Many people use these words. Choose others.')).toBeDefined();
    expect(field.value).toBe('password password');
    expect(field.getAttribute('aria-invalid')).toBe('true');
    expect(document.activeElement).toBe(field);
  });

  it('keeps the screen where nothing answers, and goes on at the next press', async () => {
    let answers = false;
    await enter('/invitation#the-secret', {
      ...routes,
      'POST /api/invitations/accept': () => (answers ? { me: ines } : lost),
    });
    await user.click(await screen.findByRole('button', { name: /This is my own phone/ }));
    expect(await screen.findByText(/could not be reached/)).toBeDefined();
    answers = true;
    await press(/This is my own phone/);
    expect(await screen.findByText('Today')).toBeDefined();
  });
});

describe('an invitation that opens nothing any more', () => {
  it.each([
    ['expired', 'This invitation is too old'],
    ['used', 'This invitation has been used'],
    ['revoked', 'This invitation no longer works'],
  ])('that is %s says so, and asks the clinic for a new one', async (state, title) => {
    const { bodies } = await enter('/invitation#the-secret', {
      'POST /api/invitations/look': () => closed(state),
      'POST /api/invitations/ask-again': () => undefined,
    });
    expect(await screen.findByText(title)).toBeDefined();
    const call = screen.getByRole('link', { name: `Call the clinic: ${clinic.phone}` });
    expect(call.getAttribute('href')).toBe('tel:5550100');
    await press('Ask the clinic for a new one');
    expect(await screen.findByText(/The clinic was told/)).toBeDefined();
    expect(bodies('POST', '/api/invitations/ask-again')).toEqual([{ invitation }]);
    expect(screen.queryByRole('button', { name: 'Ask the clinic for a new one' })).toBeNull();
  });

  it('is found out at the press where it was used up meanwhile', async () => {
    let used = false;
    await enter('/invitation#the-secret', {
      ...routes,
      'POST /api/invitations/look': () => (used ? closed('used') : open),
      'POST /api/invitations/accept': () => {
        used = true;
        return new Problem('link-spent');
      },
    });
    await user.click(await screen.findByRole('button', { name: /This is my own phone/ }));
    expect(await screen.findByText('This invitation has been used')).toBeDefined();
    expect(screen.getByRole('link', { name: 'Sign in' })).toBeDefined();
  });

  it('that nobody knows leads to the letter and to the telephone', async () => {
    await enter('/invitation#half-a-secr', { 'POST /api/invitations/look': () => new Problem('link-spent') });
    expect(await screen.findByText('This link does not work')).toBeDefined();
    expect(screen.getByRole('link', { name: 'I have a letter with a code' })).toBeDefined();
    expect(await screen.findByRole('link', { name: `Call the clinic: ${clinic.phone}` })).toBeDefined();
  });

  it('that came without its secret says what to do', async () => {
    await enter('/invitation', {});
    expect(await screen.findByText('Open your invitation again')).toBeDefined();
  });
});

describe('an invitation of staff', () => {
  it('asks nobody whose device it is, and leads from a password to the second factor', async () => {
    const { bodies } = await enter('/invitation#the-secret', {
      'POST /api/invitations/look': () => ({ ...open, kind: 'staff', firstName: 'Noor' }),
      'POST /api/invitations/accept': () => ({ me: { ...noorSignedIn, secondFactor: 'missing' } }),
    });
    await screen.findByText('Welcome, Noor');
    expect(screen.queryByText(/own phone/)).toBeNull();
    await press('Use a password instead');
    await user.type(screen.getByLabelText('New password'), 'four words in a row');
    await press('Done, take me in');
    expect(await screen.findByText('Set one up')).toBeDefined();
    expect(bodies('POST', '/api/invitations/accept')).toMatchObject([{ staySignedIn: false }]);
  });
});

describe('the letter’s code', () => {
  it('is taken however it is typed, and opens the same invitation', async () => {
    const { bodies } = await enter('/start', routes);
    await user.type(await screen.findByLabelText('Code of the letter'), 'o7k3q 9mxt2');
    await press('Go on');
    expect(await screen.findByText('Welcome, Ines')).toBeDefined();
    await press(/This is my own phone/);
    expect(await screen.findByText('Today')).toBeDefined();
    expect(bodies('POST', '/api/invitations/look')).toEqual([{ invitation: { code: '07K3Q-9MXT2' } }]);
    expect(bodies('POST', '/api/invitations/accept')).toMatchObject([
      { invitation: { code: '07K3Q-9MXT2' } },
    ]);
  });

  it('says how much of it is there, asks nobody about half a code, and keeps what was typed', async () => {
    const { bodies } = await enter('/start', routes);
    const field = await screen.findByLabelText<HTMLInputElement>('Code of the letter');
    await user.type(field, '7K3QD-9MX');
    await press('Go on');
    expect(screen.getByText(/You typed 8/)).toBeDefined();
    expect(field.value).toBe('7K3QD-9MX');
    expect(bodies('POST', '/api/invitations/look')).toEqual([]);
  });

  it('that is not right is said so beside the field', async () => {
    await enter('/start', { 'POST /api/invitations/look': () => new Problem('link-spent') });
    const field = await screen.findByLabelText('Code of the letter');
    await user.type(field, '7K3QD-9MXT2');
    await press('Go on');
    await waitFor(() => expect(field.getAttribute('aria-invalid')).toBe('true'));
    expect(screen.getByText(/That code is not right/)).toBeDefined();
    expect(document.activeElement).toBe(field);
  });
});
