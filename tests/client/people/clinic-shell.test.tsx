import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { expect, it } from 'vitest';
import type { Role } from '#shared/access/permissions.ts';
import { ClinicShell } from '#src/app/shells/ClinicShell.tsx';
import { MeContext } from '#src/app/session.tsx';
import { createQueryClient } from '#src/lib/query-client.ts';
import { startI18n } from '#src/lib/i18n.ts';
import { noorSignedIn, serve } from '../clinic/screen.tsx';
import { act } from './staff.ts';

const healthy = { lastBeatAt: null, late: false, unevaluated: 0, unsent: 2 };

async function showShellTo(roles: Role[], at: string) {
  const sent = serve({
    'GET /api/worker': () => healthy,
    'GET /api/flags': () => ({ flags: [], quiet: [], now: null }),
    'GET /api/threads': () => ({ threads: [] }),
    'GET /api/two-person-acts': () => ({ acts: [act] }),
  });
  await startI18n();
  const here = (words: string) => <p>{words}</p>;
  const router = createMemoryRouter(
    [
      {
        element: <ClinicShell />,
        children: [
          { path: '/round', handle: { permission: 'flag:read' }, element: here('the round') },
          { path: '/clinic/people', handle: { permission: 'person:manage' }, element: here('the people') },
        ],
      },
    ],
    { initialEntries: [at] },
  );
  const me = { ...noorSignedIn, personId: '4d5e6f7a-8b9c-4d0e-8f1a-2b3c4d5e6f7a', roles };
  render(
    <QueryClientProvider client={createQueryClient()}>
      <MeContext value={me}>
        <RouterProvider router={router} />
      </MeContext>
    </QueryClientProvider>,
  );
  const rail = within(await screen.findByRole('navigation', { name: 'Places' }));
  return { sent, links: () => rail.getAllByRole('link').map((link) => link.textContent) };
}

it('shows a therapist the clinical places, and takes them home from one that is not theirs', async () => {
  const { links } = await showShellTo(['therapist'], '/clinic/people');
  expect(await screen.findByText('the round')).toBeTruthy();
  expect(links()).toEqual(['Morning round', 'Caseload', 'Messages']);
});

it('shows a clinical lead what waits for a second person', async () => {
  const { links } = await showShellTo(['therapist', 'clinical-lead'], '/round');
  expect(await screen.findByText('1 to confirm')).toBeTruthy();
  expect(links().at(-1)).toContain('Clinic');
});

it('shows an administrator no round and no messages, asks for neither, and counts what did not get through', async () => {
  const { links, sent } = await showShellTo(['administrator'], '/clinic/people');
  expect(await screen.findByText('the people')).toBeTruthy();
  expect(await screen.findByText('1 to confirm, 2 not delivered')).toBeTruthy();
  expect(links()[0]).toBe('Caseload');
  expect(links()).toHaveLength(2);
  expect(sent.map(({ path }) => path)).not.toContain('/api/flags');
  expect(sent.map(({ path }) => path)).not.toContain('/api/threads');
});
