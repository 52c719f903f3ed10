import { screen, waitFor, within } from '@testing-library/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';
import { lost, serve } from '../clinic/screen.tsx';
import { aDraft } from './drafts.ts';
import { arriveAsInes, heading, press, showFlow, tick } from './flow-screen.tsx';

let ines: Me;
beforeEach(async () => {
  ines = await arriveAsInes();
});
const show = (start: CheckInDraft) => showFlow(ines, start);

const receipt = (body: unknown) => {
  const { id, checkInId } = body as { id: string; checkInId: string };
  return { id, checkInId, receivedAt: '2026-12-01T08:41:00.000Z', seen: null };
};
const json = (body: unknown) =>
  new Response(JSON.stringify(body), { headers: { 'content-type': 'application/json' } });

describe('an emergency answer', () => {
  it('brings the caution up at the tick with no network, says that nothing is sent, and then who has seen it', async () => {
    let online = false;
    let seen = false;
    const sent = serve({
      'POST /api/alerts': ({ body }) => (online ? receipt(body) : lost),
    });
    const known = fetch;
    vi.stubGlobal('fetch', async (address: string, init: RequestInit) => {
      if (init.method !== 'GET') return known(address, init);
      const id = address.split('/').at(-1);
      const petra = { by: 'Petra Lindqvist', at: '2026-12-01T08:43:00.000Z' };
      return json({ ...receipt({ id, checkInId: aDraft().id }), seen: seen ? petra : null });
    });
    const { queryClient } = await show(aDraft({ at: 'danger' }));
    await tick('Chest pain or trouble breathing');
    expect(heading().textContent).toContain('Call 911 now');
    expect(screen.getByRole('link', { name: 'Call 911' }).getAttribute('href')).toBe('tel:911');
    expect(screen.getByText(/chest pain or trouble breathing\./)).toBeDefined();
    expect(screen.getByText('Not sent yet.')).toBeDefined();
    online = true;
    window.dispatchEvent(new Event('online'));
    expect(await screen.findByText(/Sent to the clinic/)).toBeDefined();
    expect(screen.getByText(/Nobody has seen it yet/)).toBeDefined();
    seen = true;
    await queryClient.invalidateQueries({ queryKey: ['alerts'] });
    expect(await screen.findByText(/Petra Lindqvist has seen it/)).toBeDefined();
    expect(new Set(sent.map(({ body }) => (body as { id: string }).id)).size).toBe(1);
  });

  it('is taken back as a mistake: a record of its own, and the question stands without the tick', async () => {
    const sent = serve({
      'POST /api/alerts': ({ body }) => receipt(body),
    });
    const known = fetch;
    vi.stubGlobal('fetch', async (address: string, init: RequestInit) => {
      const mistake = /^\/api\/alerts\/([^/]+)\/mistakes$/.exec(address);
      if (mistake) sent.push({ method: 'POST', path: 'mistake', body: mistake[1] });
      if (mistake || init.method === 'GET') return json(receipt({ id: 'x', checkInId: 'y' }));
      return known(address, init);
    });
    await show(aDraft({ at: 'danger' }));
    await tick('Hand cold, pale or blue');
    await press('I ticked this by mistake');
    expect(heading().textContent).toContain('Any of these');
    expect(screen.getByRole('checkbox', { name: 'Hand cold, pale or blue' })).toHaveProperty(
      'checked',
      false,
    );
    expect(screen.getByRole('status').textContent).toContain('Taken back');
    await waitFor(() => expect(sent.map(({ path }) => path)).toEqual(['/api/alerts', 'mistake']));
    expect(sent[1]?.body).toBe((sent[0]?.body as { id: string }).id);
  });

  it('can still be taken back after a reload, when the clinic has had the alert for a while', async () => {
    const alertId = '0d6f3a51-7c0c-4a2b-9c53-1d3ad1a1e001';
    const sent = serve({
      [`GET /api/alerts/${alertId}`]: () => receipt({ id: alertId, checkInId: aDraft().id }),
      [`POST /api/alerts/${alertId}/mistakes`]: ({ body }) => body,
    });
    await show(
      aDraft({
        at: 'danger',
        answers: { danger: ['cold-hand'] },
        alerts: [{ id: alertId, findings: [] }],
        caution: { alertId, answersBefore: {}, atBefore: 'danger' },
      }),
    );
    await press('I ticked this by mistake');
    expect(screen.getByRole('status').textContent).toContain('Taken back');
    await waitFor(() =>
      expect(sent.filter(({ method }) => method === 'POST').map(({ path }) => path)).toEqual([
        `/api/alerts/${alertId}/mistakes`,
      ]),
    );
  });

  it('promises a call only in opening hours, and names the on-call line in the others', async () => {
    serve({ 'POST /api/alerts': () => lost });
    const popped = {
      at: 'pop-signs',
      answers: { symptoms: ['pop-or-slip' as const] },
    };
    const open = await show(aDraft(popped));
    await tick('The shoulder looks different');
    expect(heading().textContent).toBe('We will call you');
    expect(screen.getByText(/^We will call you\. Keep your phone near/)).toBeDefined();
    open.unmount();

    ines = { ...ines, clinic: { ...ines.clinic, openNow: false, opensAt: null } };
    await show(aDraft({ ...popped, mode: 'something-new' }));
    await tick('The shoulder looks different');
    expect(heading().textContent).toBe('Call the on-call line now');
    expect(screen.queryByText(/We will call you/)).toBeNull();
    expect(screen.getByText(/^The clinic is closed now\./)).toBeDefined();
    const calls = within(screen.getByRole('main')).getAllByRole('link');
    expect(calls[0]?.getAttribute('href')).toBe('tel:5550110');
    await press('Go on');
  });

  it('lets the person go on with the check-in after the caution', async () => {
    serve({ 'POST /api/alerts': () => lost });
    await show(aDraft({ at: 'danger' }));
    await tick('Chest pain or trouble breathing');
    await press('Go on with the check-in');
    expect(screen.getByRole('checkbox', { name: 'Chest pain or trouble breathing' })).toHaveProperty(
      'checked',
      true,
    );
    await press('Next');
    expect(heading().textContent).toContain('Chest pain or trouble breathing: when?');
  });

  it('has a screen of its own with the crisis line for thoughts of self-harm', async () => {
    serve({ 'POST /api/alerts': () => lost });
    await show(aDraft({ at: 'self-harm', answers: { symptoms: ['low-mood'] } }));
    expect(screen.getByText(/not right away\. If you need someone now, call 988\./)).toBeDefined();
    await press('Not sure');
    expect(heading().textContent).toContain('Please talk to someone now');
    const calls = within(screen.getByRole('main')).getAllByRole('link');
    expect(calls[0]?.getAttribute('href')).toBe('tel:988');
  });
});
