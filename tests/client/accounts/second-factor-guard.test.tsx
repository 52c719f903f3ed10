import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { beforeEach, expect, it, vi } from 'vitest';
import { clinicianRoles, roles } from '#shared/access/permissions.ts';
import { RequireRole } from '#src/app/RequireRole.tsx';
import { startI18n } from '#src/lib/i18n.ts';
import { createQueryClient } from '#src/lib/query-client.ts';
import { noorSignedIn, serve } from '../clinic/screen.tsx';

vi.mock('#src/lib/socket.ts', () => ({ connectHints: () => () => undefined }));

function show(secondFactor: 'given' | 'missing', at: string) {
  serve({ 'GET /api/session': () => ({ me: { ...noorSignedIn, secondFactor } }) });
  const router = createMemoryRouter(
    [
      {
        element: <RequireRole anyOf={clinicianRoles} />,
        children: [{ path: '/round', element: <p>The morning round</p> }],
      },
      {
        element: <RequireRole anyOf={roles} />,
        children: [{ path: '/second-factor', element: <p>Set one up</p> }],
      },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
}

beforeEach(startI18n);

it('staff without a second factor are led to setting one up, from wherever they come', async () => {
  show('missing', '/round');
  expect(await screen.findByText('Set one up')).toBeDefined();
  expect(screen.queryByText('The morning round')).toBeNull();
});

it('staff who have given one go on to their work', async () => {
  show('given', '/round');
  expect(await screen.findByText('The morning round')).toBeDefined();
});
