import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { ForgotPasswordPage } from '#src/pages/ForgotPasswordPage.tsx';
import { InvitationPage } from '#src/pages/InvitationPage.tsx';
import { ResetPasswordPage } from '#src/pages/ResetPasswordPage.tsx';
import { SignInPage } from '#src/pages/SignInPage.tsx';
import { StartPage } from '#src/pages/StartPage.tsx';
import { clinic, noorSignedIn, serve } from '../clinic/screen.tsx';
import type { Answer } from '../clinic/screen.tsx';

export const user = userEvent.setup({ delay: null });

export const ines: Me = {
  ...noorSignedIn,
  personId: '5d0a8f5e-6a52-4f0b-8a44-3b6f6b0f2a11',
  name: 'Ines Valcourt',
  email: 'ines@valcourt.example',
  roles: ['patient'],
  secondFactor: 'not-needed',
};

export const press = (name: string | RegExp) => user.click(screen.getByRole('button', { name }));

/** What the pages before the sign-in ask of every server. */
const surroundings: Record<string, Answer> = {
  'GET /api/session': () => ({ me: null }),
  'GET /api/sign-in-page': () => ({
    clinic: { name: clinic.name, phone: clinic.phone, emergencyNumber: clinic.emergencyNumber },
    demo: false,
  }),
};

/** Opens a page before the sign-in, as somebody whom nobody knows yet. */
export async function enter(at: string, routes: Record<string, Answer>) {
  await startI18n();
  await loadWords(['accounts']);
  const sent = serve({ ...surroundings, ...routes });
  const queryClient = createQueryClient();
  queryClient.setDefaultOptions({ queries: { retry: false } });
  const router = createMemoryRouter(
    [
      { path: '/sign-in', element: <SignInPage /> },
      { path: '/invitation', element: <InvitationPage /> },
      { path: '/start', element: <StartPage /> },
      { path: '/forgot-password', element: <ForgotPasswordPage /> },
      { path: '/reset-password', element: <ResetPasswordPage /> },
      { path: '/today', element: <p>Today</p> },
      { path: '/round', element: <p>The morning round</p> },
      { path: '/second-factor', element: <p>Set one up</p> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  /** The bodies that were sent to one route, in their order. */
  const bodies = (method: string, path: string) =>
    sent.filter((request) => request.method === method && request.path === path).map(({ body }) => body);
  return { router, bodies };
}

const bytes = (...values: number[]) => new Uint8Array(values).buffer;

/** What the server asks; the browser's own library reads it. */
export const question = {
  challengeId: '3c0e8f0a-2a44-4f0e-9a52-0f3a7c1e6a52',
  options: {
    challenge: 'AQID',
    rp: { id: 'localhost', name: 'Espalier' },
    user: { id: 'BAUG', name: 'ines@valcourt.example', displayName: 'Ines Valcourt' },
    pubKeyCredParams: [{ type: 'public-key', alg: -7 }],
  },
};

type Ceremony = () => Promise<unknown>;

const refuse =
  (name: string): Ceremony =>
  () =>
    Promise.reject(new DOMException('not now', name));

/** What a browser throws (W3C Web Authentication, level 3, sections 5.1.3 and 5.1.4). */
export const cancelled = refuse('NotAllowedError');
export const alreadyHere = refuse('InvalidStateError');

const made: Ceremony = () =>
  Promise.resolve({
    id: 'BwgJ',
    rawId: bytes(7, 8, 9),
    type: 'public-key',
    response: {
      attestationObject: bytes(1),
      clientDataJSON: bytes(2),
      authenticatorData: bytes(3),
      signature: bytes(4),
      userHandle: bytes(4, 5, 6),
    },
    getClientExtensionResults: () => ({}),
  });

/** A browser that can make and use passkeys; jsdom cannot. */
export function withPasskeys({ create = made, get = made }: { create?: Ceremony; get?: Ceremony } = {}) {
  vi.stubGlobal('PublicKeyCredential', class {});
  Object.defineProperty(navigator, 'credentials', { configurable: true, value: { create, get } });
}

export function withoutPasskeys() {
  vi.stubGlobal('PublicKeyCredential', undefined);
}
