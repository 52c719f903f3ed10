import { screen, within } from '@testing-library/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { WaysIn } from '#shared/accounts/ways-in-contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { SecondFactorSetupPage } from '#src/pages/SecondFactorSetupPage.tsx';
import { WaysInPage } from '#src/pages/WaysInPage.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { cancelled, ines, press, question, user, withoutPasskeys, withPasskeys } from './entrance.tsx';

const phone = {
  id: '9c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52',
  name: 'Chrome on Android',
  createdAt: '2026-11-01T08:00:00.000Z',
  lastUsedAt: null,
};
const waysIn: WaysIn = {
  email: 'noor.haddad@orchard-lane.example',
  hasPassword: true,
  passkeys: [phone],
  authenticator: false,
  recoveryCodesLeft: 0,
  pendingEmail: null,
};
const session = {
  id: '1c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52',
  device: 'Firefox on Windows',
  startedAt: '2026-12-01T07:00:00.000Z',
  lastActivityAt: '2026-12-01T07:30:00.000Z',
  current: true,
  staysSignedIn: false,
  push: false,
};
const tablet = {
  ...session,
  id: '2c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52',
  device: 'Safari on iPad',
  current: false,
};
const recoveryCodes = ['k7q2-m4xt-9d3h', 'p2w8-c6rn-5v1j'];
const setup = {
  secret: 'JBSWY3DPEHPK3PXP',
  uri: 'otpauth://totp/Espalier',
  picture: 'data:image/svg+xml;base64,',
};

const routes: Record<string, Answer> = {
  'GET /api/ways-in': () => waysIn,
  'GET /api/sessions': () => ({ sessions: [session, tablet] }),
  'POST /api/authenticator': () => setup,
  'POST /api/authenticator/confirmation': () => ({ recoveryCodes }),
};

async function show(me: Me = noorSignedIn, more: Record<string, Answer> = {}) {
  const sent = serve({ ...routes, ...more });
  await startI18n();
  await loadWords(['accounts']);
  await showTo(me, <WaysInPage />);
  return sent;
}

/** Sets the second factor up as staff must who have none. */
async function setUp(more: Record<string, Answer> = {}) {
  const me: Me = { ...noorSignedIn, secondFactor: 'missing' };
  const sent = serve({
    ...routes,
    'GET /api/session': () => ({ me: noorSignedIn }),
    'GET /api/sign-in-page': () => ({ clinic: null, demo: false }),
    ...more,
  });
  await startI18n();
  await loadWords(['accounts']);
  const { router, queryClient } = await showTo(me, <SecondFactorSetupPage />, { at: '/second-factor' });
  queryClient.setQueryData(sessionQuery.queryKey, { me });
  return { sent, router };
}

beforeEach(withoutPasskeys);

describe('the recovery codes', () => {
  it('are shown once, and the way on opens only to whoever says that they are kept', async () => {
    const { router } = await setUp();
    await user.click(await screen.findByRole('button', { name: /An authenticator app/ }));
    expect(await screen.findByText('JBSW Y3DP EHPK 3PXP')).toBeDefined();
    await user.type(screen.getByLabelText(/enter the code that the app shows/), '123456');
    const list = await screen.findByRole('list', { name: 'Recovery codes' });
    expect(
      within(list)
        .getAllByRole('listitem')
        .map(({ textContent }) => textContent),
    ).toEqual(recoveryCodes);
    await press('Go on');
    expect(await screen.findByText(/Keep the codes first/)).toBeDefined();
    expect(router.state.location.pathname).toBe('/second-factor');
    await user.click(screen.getByRole('checkbox', { name: 'I have kept them' }));
    await press('Go on');
    await vi.waitFor(() => expect(router.state.location.pathname).toBe('/'));
  });

  it('come with a passkey too', async () => {
    withPasskeys();
    await setUp({
      'POST /api/passkeys/question': () => question,
      'POST /api/passkeys': () => waysIn,
      'POST /api/recovery-codes': () => ({ recoveryCodes }),
    });
    await user.click(await screen.findByRole('button', { name: /A passkey/ }));
    expect(await screen.findByRole('list', { name: 'Recovery codes' })).toBeDefined();
  });

  it('are copied, and where the browser refuses that it is said', async () => {
    const clipboard = vi.spyOn(navigator.clipboard, 'writeText').mockRejectedValueOnce(new Error('refused'));
    await setUp();
    await user.click(await screen.findByRole('button', { name: /An authenticator app/ }));
    await user.type(await screen.findByLabelText(/enter the code that the app shows/), '123456');
    await user.click(await screen.findByRole('button', { name: 'Copy' }));
    expect(await screen.findByText(/could not be copied/)).toBeDefined();
    clipboard.mockResolvedValueOnce();
    await press('Copy');
    expect(await screen.findByText('Copied.')).toBeDefined();
    expect(clipboard).toHaveBeenLastCalledWith(recoveryCodes.join('\n'));
  });
});

describe('a passkey', () => {
  it('is removed only after a second word, and it is said', async () => {
    const sent = await show(noorSignedIn, {
      'DELETE /api/passkeys/9c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52': () => ({ ...waysIn, passkeys: [] }),
    });
    await user.click(await screen.findByRole('button', { name: 'Remove Chrome on Android' }));
    const dialog = await screen.findByRole('alertdialog');
    expect(sent.filter(({ method }) => method === 'DELETE')).toEqual([]);
    await user.click(within(dialog).getByRole('button', { name: 'Remove' }));
    expect(await screen.findByText('The passkey is removed.')).toBeDefined();
    expect(screen.queryByText('Chrome on Android')).toBeNull();
  });

  it('that is the last way in stays, with the server’s reason', async () => {
    await show(noorSignedIn, {
      'DELETE /api/passkeys/9c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52': () =>
        new Problem('state-conflict', 'This is your only way in.'),
    });
    await user.click(await screen.findByRole('button', { name: 'Remove Chrome on Android' }));
    await user.click(within(await screen.findByRole('alertdialog')).getByRole('button', { name: 'Remove' }));
    expect(await screen.findByText('This is your only way in.')).toBeDefined();
    expect(screen.getByText('Chrome on Android')).toBeDefined();
  });

  it('that was not made changes nothing', async () => {
    withPasskeys({ create: cancelled });
    await show(noorSignedIn, { 'POST /api/passkeys/question': () => question });
    await user.click(await screen.findByRole('button', { name: 'Add a passkey of this device' }));
    expect(await screen.findByText('No passkey was made. You can try again.')).toBeDefined();
  });
});

describe('the other ways in', () => {
  it('sends the link for a new address there, and says so', async () => {
    const pendingEmail = 'noor@orchard-lane.example';
    await show(noorSignedIn, { 'POST /api/email-changes': () => ({ ...waysIn, pendingEmail }) });
    await user.click(await screen.findByRole('button', { name: 'Change the e-mail' }));
    await user.type(screen.getByLabelText('New e-mail'), pendingEmail);
    await press('Send a link there');
    expect(await screen.findByText(/We sent a link to noor@orchard-lane\.example/)).toBeDefined();
    expect(screen.getByText(/You sign in with noor\.haddad@/)).toBeDefined();
  });

  it('says that a new password signs the other devices out', async () => {
    await show(noorSignedIn, { 'PUT /api/password': () => waysIn });
    await user.click(await screen.findByRole('button', { name: 'Change the password' }));
    await user.type(screen.getByLabelText('New password'), 'four words in a row');
    await press('Save');
    expect(await screen.findByText(/Your other devices are signed out/)).toBeDefined();
  });

  it('shows patients no authenticator app, unless they have one', async () => {
    await show(ines);
    await screen.findByText('Chrome on Android');
    expect(screen.queryByText('Authenticator app')).toBeNull();
  });
});

describe('the devices', () => {
  it('mark the one in the hand, which cannot be signed out by mistake here', async () => {
    await show();
    const row = (await screen.findByText('Firefox on Windows')).closest('li');
    expect(row?.textContent).toContain('This one');
    expect(within(row as HTMLElement).queryByRole('button')).toBeNull();
  });

  it('are signed out one by one, by name', async () => {
    let ended = false;
    await show(noorSignedIn, {
      'GET /api/sessions': () => ({ sessions: ended ? [session] : [session, tablet] }),
      'DELETE /api/sessions/2c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52': () => {
        ended = true;
      },
    });
    await user.click(await screen.findByRole('button', { name: 'Sign out Safari on iPad' }));
    expect(await screen.findByText('Safari on iPad is signed out.')).toBeDefined();
    expect(await screen.findByText('You are signed in on this device only.')).toBeDefined();
  });

  it('are all signed out but this one, after a second word', async () => {
    await show(noorSignedIn, { 'DELETE /api/sessions': () => ({ ended: 1 }) });
    await user.click(await screen.findByRole('button', { name: 'Sign out all others' }));
    const dialog = await screen.findByRole('alertdialog');
    await user.click(within(dialog).getByRole('button', { name: 'Sign out all others' }));
    expect(await screen.findByText('1 device is signed out.')).toBeDefined();
  });
});
