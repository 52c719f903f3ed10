import { screen, waitFor } from '@testing-library/react';
import { beforeEach, describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { clinic, noorSignedIn } from '../clinic/screen.tsx';
import { cancelled, enter, ines, press, question, user, withPasskeys, withoutPasskeys } from './entrance.tsx';

const pendingId = '1b0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52';
const halfDone = (ways: string[]) => () => ({ next: 'second-factor', pendingId, ways });

async function typePassword() {
  await user.type(await screen.findByLabelText('E-mail'), 'noor.haddad@orchard-lane.example');
  await user.type(screen.getByLabelText('Password'), 'a long row of words');
  await press('Sign in');
}

beforeEach(() => {
  localStorage.clear();
  withoutPasskeys();
});

describe('the second step of staff', () => {
  it('takes the code at its sixth digit, without another press, and leads on', async () => {
    const { bodies } = await enter('/sign-in', {
      'POST /api/session': halfDone(['authenticator', 'recovery-code']),
      'POST /api/session/second-factor': () => ({ me: noorSignedIn }),
    });
    await typePassword();
    const field = await screen.findByLabelText('Code of six digits');
    expect(document.activeElement).toBe(field);
    expect(field.getAttribute('autocomplete')).toBe('one-time-code');
    expect(field.getAttribute('inputmode')).toBe('numeric');
    await user.type(field, '123 456');
    expect(await screen.findByText('The morning round')).toBeDefined();
    expect(bodies('POST', '/api/session/second-factor')).toEqual([
      { pendingId, answer: { way: 'authenticator', code: '123456' } },
    ]);
  });

  it('says beside the field that a code is not right, and makes room for the next one', async () => {
    let tries = 0;
    await enter('/sign-in', {
      'POST /api/session': halfDone(['authenticator']),
      'POST /api/session/second-factor': () => {
        tries += 1;
        return tries === 1 ? new Problem('wrong-code') : { me: noorSignedIn };
      },
    });
    await typePassword();
    const field = await screen.findByLabelText<HTMLInputElement>('Code of six digits');
    await user.type(field, '111111');
    await waitFor(() => expect(field.getAttribute('aria-invalid')).toBe('true'));
    expect(field.value).toBe('');
    expect(document.activeElement).toBe(field);
    expect(screen.getByText(/or it was used before/)).toBeDefined();
    await user.type(field, '222222');
    expect(await screen.findByText('The morning round')).toBeDefined();
  });

  it('says how long to wait after too many tries', async () => {
    await enter('/sign-in', {
      'POST /api/session': halfDone(['authenticator']),
      'POST /api/session/second-factor': () =>
        new Problem('too-many-attempts', undefined, { retryAfter: 30 }),
    });
    await typePassword();
    await user.type(await screen.findByLabelText('Code of six digits'), '111111');
    expect((await screen.findByText(/Too many tries/)).textContent).toContain('30 seconds');
  });

  it('begins again where the half-done sign-in is over', async () => {
    await enter('/sign-in', {
      'POST /api/session': halfDone(['authenticator']),
      'POST /api/session/second-factor': () => new Problem('link-spent'),
    });
    await typePassword();
    await user.type(await screen.findByLabelText('Code of six digits'), '111111');
    expect(await screen.findByText(/This sign-in took too long/)).toBeDefined();
    await press('Start again');
    expect(await screen.findByLabelText('Password')).toBeDefined();
  });

  it('takes a recovery code instead', async () => {
    const { bodies } = await enter('/sign-in', {
      'POST /api/session': halfDone(['authenticator', 'recovery-code']),
      'POST /api/session/second-factor': () => ({ me: noorSignedIn }),
    });
    await typePassword();
    await screen.findByLabelText('Code of six digits');
    await press('Use a recovery code');
    await user.type(screen.getByLabelText('Recovery code'), 'k7q2-m4xt{Enter}');
    expect(await screen.findByText('The morning round')).toBeDefined();
    expect(bodies('POST', '/api/session/second-factor')).toEqual([
      { pendingId, answer: { way: 'recovery-code', code: 'k7q2-m4xt' } },
    ]);
  });

  it('leads staff without a second factor to setting one up, wherever they were going', async () => {
    await enter('/sign-in?then=/round', {
      'POST /api/session': () => ({ next: 'none', me: { ...noorSignedIn, secondFactor: 'missing' } }),
    });
    await typePassword();
    expect(await screen.findByText('Set one up')).toBeDefined();
  });
});

describe('the passkey', () => {
  const asked = {
    'POST /api/session/passkey-question': () => question,
    'POST /api/session/passkey': () => ({ me: ines }),
  };
  const buttons = () =>
    screen
      .getAllByRole('button')
      .map(({ textContent }) => textContent)
      .filter((text) => text !== '');

  it('signs in without typing, and stands first on this device from then on', async () => {
    withPasskeys();
    const { bodies } = await enter('/sign-in', asked);
    await screen.findByText(clinic.name);
    expect(buttons()).toEqual(['Sign in', 'Sign in with a passkey']);
    await press('Sign in with a passkey');
    expect(await screen.findByText('Today')).toBeDefined();
    expect(bodies('POST', '/api/session/passkey')).toMatchObject([
      { passkey: { challengeId: question.challengeId, response: { id: 'BwgJ' } }, staySignedIn: false },
    ]);
    await enter('/sign-in', asked);
    await screen.findByText(clinic.name);
    expect(buttons()).toEqual(['Sign in with a passkey', 'Sign in']);
  });

  it('leaves what was typed where the person closes the browser’s window', async () => {
    withPasskeys({ get: cancelled });
    const { bodies } = await enter('/sign-in', asked);
    await user.type(await screen.findByLabelText('E-mail'), 'ines@valcourt.example');
    await press('Sign in with a passkey');
    expect(await screen.findByText(/The passkey was not used/)).toBeDefined();
    expect(screen.getByLabelText<HTMLInputElement>('E-mail').value).toBe('ines@valcourt.example');
    expect(bodies('POST', '/api/session/passkey')).toEqual([]);
  });

  it('is not offered where the browser has none', async () => {
    await enter('/sign-in', {});
    await screen.findByText(clinic.name);
    expect(buttons()).toEqual(['Sign in']);
  });
});

describe('the sign-in page', () => {
  it('speaks of the outbox in a demo only', async () => {
    await enter('/sign-in', {});
    await screen.findByText(clinic.name);
    expect(screen.queryByText(/Demo/)).toBeNull();
    await enter('/sign-in', { 'GET /api/sign-in-page': () => ({ clinic: null, demo: true }) });
    const link = await screen.findByRole('link', { name: 'outbox' });
    expect(link.getAttribute('href')).toBe('/outbox');
  });

  it('says the same of a forgotten password whether the address is known or not, and then leads back', async () => {
    const { bodies } = await enter('/sign-in', { 'POST /api/password-resets': () => undefined });
    await user.click(await screen.findByRole('link', { name: 'Forgot your password?' }));
    await user.type(await screen.findByLabelText('E-mail'), 'nobody');
    await press('Send me the link');
    expect(await screen.findByText('That is not an e-mail address.')).toBeDefined();
    await user.type(screen.getByLabelText('E-mail'), '@valcourt.example');
    await press('Send me the link');
    expect(await screen.findByText(/If we know that e-mail/)).toBeDefined();
    expect(document.activeElement?.textContent).toBe('Look at your mail');
    expect(bodies('POST', '/api/password-resets')).toEqual([{ email: 'nobody@valcourt.example' }]);
    await user.click(screen.getByRole('link', { name: 'Go to sign-in' }));
    expect(await screen.findByLabelText('Password')).toBeDefined();
  });

  it('takes a new password by the link of the mail, and asks for a sign-in with it', async () => {
    const { bodies, router } = await enter('/reset-password#the-secret', {
      'POST /api/password-resets/use': () => undefined,
    });
    await user.type(await screen.findByLabelText('New password'), 'four words in a row');
    expect(router.state.location.hash).toBe('');
    await press('Set the new password');
    expect(await screen.findByText(/Your new password is set/)).toBeDefined();
    expect(bodies('POST', '/api/password-resets/use')).toEqual([
      { token: 'the-secret', password: 'four words in a row' },
    ]);
  });

  it('offers a new link where that of the mail is spent', async () => {
    await enter('/reset-password#the-secret', {
      'POST /api/password-resets/use': () => new Problem('link-spent'),
    });
    await user.type(await screen.findByLabelText('New password'), 'four words in a row');
    await press('Set the new password');
    expect(await screen.findByText('This link no longer works')).toBeDefined();
    const again = screen.getByRole('link', { name: 'Send me a new link' });
    expect(again.getAttribute('href')).toBe('/forgot-password');
  });
});
