import { QueryClientProvider, useMutation } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import { useState } from 'react';
import { beforeEach, describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import { isProofNeeded } from '#src/app/proof-needed.ts';
import { ProofHost, useProven } from '#src/app/proof.tsx';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { serve } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';
import { call } from '#src/lib/api.ts';
import type { askEmailChange } from '#shared/accounts/ways-in-contract.ts';
import { cancelled, press, question, user, withPasskeys, withoutPasskeys } from './entrance.tsx';

const waysIn = {
  email: 'noor.haddad@orchard-lane.example',
  hasPassword: true,
  passkeys: [],
  authenticator: true,
  recoveryCodesLeft: 10,
  pendingEmail: null,
};
const passkey = { id: 'a', name: 'Phone', createdAt: '2026-11-01T08:00:00.000Z', lastUsedAt: null };

/** A form whose act the server takes from somebody who has just proved who they are, and from nobody else. */
function SensitiveForm() {
  const withProof = useProven();
  const [email, setEmail] = useState('');
  const change = useMutation({
    mutationFn: () =>
      withProof(() => call<typeof askEmailChange>('post', '/api/email-changes', { body: { email } })),
  });
  return (
    <>
      <label>
        New address
        <input value={email} onChange={({ target }) => setEmail(target.value)} />
      </label>
      <button type="button" onClick={() => change.mutate()}>
        Change it
      </button>
      <p>
        {change.isSuccess ? 'Changed' : change.isError ? `Refused: ${isProofNeeded(change.error)}` : 'Idle'}
      </p>
    </>
  );
}

let proven: boolean;

function show(routes: Record<string, Answer> = {}, host = true) {
  proven = false;
  const sent = serve({
    'GET /api/ways-in': () => waysIn,
    'POST /api/email-changes': () => (proven ? waysIn : new Problem('proof-needed')),
    'POST /api/session/proof': () => {
      proven = true;
    },
    ...routes,
  });
  const queryClient = createQueryClient();
  queryClient.setDefaultOptions({ queries: { retry: false } });
  render(
    <QueryClientProvider client={queryClient}>
      <SensitiveForm />
      {host ? <ProofHost /> : null}
    </QueryClientProvider>,
  );
  return (path: string) => sent.filter((request) => request.path === path).map(({ body }) => body);
}

async function begin() {
  await user.type(screen.getByLabelText('New address'), 'noor@orchard-lane.example');
  await press('Change it');
}

beforeEach(async () => {
  withoutPasskeys();
  await startI18n();
  await loadWords(['accounts']);
});

describe('an act that needs a fresh proof', () => {
  it('waits for the password, and is then done with what was typed before', async () => {
    const bodies = show();
    await begin();
    const dialog = await screen.findByRole('dialog', { name: 'Is it you?' });
    expect(dialog).toBeDefined();
    const field = await screen.findByLabelText('Password');
    await waitFor(() => expect(document.activeElement).toBe(field));
    await user.type(field, 'a long row of words{Enter}');
    expect(await screen.findByText('Changed')).toBeDefined();
    expect(screen.queryByRole('dialog')).toBeNull();
    expect(bodies('/api/session/proof')).toEqual([{ way: 'password', password: 'a long row of words' }]);
    expect(bodies('/api/email-changes')).toEqual([
      { email: 'noor@orchard-lane.example' },
      { email: 'noor@orchard-lane.example' },
    ]);
  });

  it.each([
    ['Escape', () => user.keyboard('{Escape}')],
    ['the cross', () => press('Cancel')],
  ])('is not done after %s, and everything stays as it was', async (_, close) => {
    const bodies = show();
    await begin();
    await screen.findByLabelText('Password');
    await close();
    expect(await screen.findByText('Refused: true')).toBeDefined();
    expect(screen.getByLabelText<HTMLInputElement>('New address').value).toBe('noor@orchard-lane.example');
    expect(bodies('/api/email-changes')).toHaveLength(1);
    expect(bodies('/api/session/proof')).toEqual([]);
  });

  it('goes on asking after a wrong password, and takes the code of the app as well', async () => {
    let tries = 0;
    const bodies = show({
      'POST /api/session/proof': () => {
        tries += 1;
        if (tries === 1) return new Problem('wrong-code');
        proven = true;
        return undefined;
      },
    });
    await begin();
    await user.type(await screen.findByLabelText('Password'), 'not it{Enter}');
    expect(await screen.findByText('That password is not right. Try again.')).toBeDefined();
    await press('Use the code of your app');
    await user.type(screen.getByLabelText('Code of six digits'), '123456');
    expect(await screen.findByText('Changed')).toBeDefined();
    expect(bodies('/api/session/proof')).toEqual([
      { way: 'password', password: 'not it' },
      { way: 'authenticator', code: '123456' },
    ]);
  });

  it('asks for the passkey first, and for the password where that does not work', async () => {
    withPasskeys({ get: cancelled });
    show({
      'GET /api/ways-in': () => ({ ...waysIn, passkeys: [passkey] }),
      'POST /api/session/proof/passkey-question': () => question,
    });
    await begin();
    await user.click(await screen.findByRole('button', { name: 'Use your passkey' }));
    expect(await screen.findByText(/The passkey was not used/)).toBeDefined();
    await press('Use your password');
    await user.type(await screen.findByLabelText('Password'), 'a long row of words{Enter}');
    expect(await screen.findByText('Changed')).toBeDefined();
  });

  it('says so where no way of this person works on this device', async () => {
    show({
      'GET /api/ways-in': () => ({
        ...waysIn,
        hasPassword: false,
        authenticator: false,
        passkeys: [passkey],
      }),
    });
    await begin();
    expect(await screen.findByText(/You cannot prove it on this device/)).toBeDefined();
  });

  it('stays refused, and waits for nothing, where the question cannot be shown', async () => {
    show({}, false);
    await begin();
    expect(await screen.findByText('Refused: true')).toBeDefined();
  });
});
