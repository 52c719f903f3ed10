import { screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { WorkerBanner } from '#src/features/clinic/WorkerBanner.tsx';
import { clinic, lost, noorSignedIn, serve, showTo } from './screen.tsx';

const health = { lastBeatAt: '2026-12-01T12:00:00.000Z', late: false, unevaluated: 0, unsent: 0 };

async function showBanner(answer: () => unknown) {
  const sent = serve({ 'GET /api/worker': answer });
  await showTo(noorSignedIn, <WorkerBanner clinic={clinic} />);
  return sent;
}

describe('the banner over every clinic screen', () => {
  it('says that check-ins may be shown late when the worker is late', async () => {
    await showBanner(() => ({ ...health, late: true }));
    expect((await screen.findByText(/may be shown late/)).closest('[role="alert"]')).not.toBeNull();
    expect(screen.getByRole('link', { name: '555-0110' })).toBeTruthy();
  });

  it('says so as well when check-ins wait though the worker lives', async () => {
    await showBanner(() => ({ ...health, unevaluated: 2 }));
    expect(await screen.findByText(/2 check-ins wait for the rules/)).toBeTruthy();
  });

  it('says that notifications did not get through, and to look at the round, though no check-in is late', async () => {
    await showBanner(() => ({ ...health, unsent: 2 }));
    const title = await screen.findByText('2 notifications did not get through.');
    expect(title.closest('[role="alert"]')?.textContent).toContain(
      'Look at the round itself, not only at your phone and mail.',
    );
    expect(screen.queryByText(/may be shown late/)).toBeNull();
  });

  it('says that the screen may be old when the server does not answer', async () => {
    await showBanner(() => lost);
    expect(await screen.findByText(/What you see may be old/)).toBeTruthy();
  });
});
