import { screen } from '@testing-library/react';
import { beforeEach, describe, expect, it } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';
import { lost, serve } from '../clinic/screen.tsx';
import { aDraft } from './drafts.ts';
import { arriveAsInes, heading, press, showFlow, tick } from './flow-screen.tsx';

let ines: Me;
beforeEach(async () => {
  ines = await arriveAsInes();
});
const show = (start: CheckInDraft = aDraft()) => showFlow(ines, start);

const checkInReceipt = (body: unknown) => ({
  id: (body as { id: string }).id,
  receivedAt: '2026-12-01T08:41:00.000Z',
  localDate: '2026-12-01',
  clockDoubtful: false,
});
const reviewed = () =>
  aDraft({
    answers: {
      painNow: 3,
      painWorst: 4,
      swelling: 'same',
      sling: ['as-advised'],
      dangerNone: true,
      symptomsNone: true,
    },
    at: 'review',
  });

describe('a check-in', () => {
  it('asks one question a screen with nothing picked, and shows the usual only after the answer', async () => {
    await show();
    expect(heading().textContent).toContain('How much does your shoulder hurt right now?');
    expect(screen.queryByText(/usual/)).toBeNull();
    expect(screen.queryAllByRole('button', { pressed: true })).toEqual([]);
    await press('4');
    expect(heading().textContent).toContain('What was the worst pain since Friday?');
    expect(screen.getByRole('status').textContent).toContain('4. Your usual is 3.');
  });

  it('takes an answer back by undo', async () => {
    await show();
    await press('4');
    await press('Undo');
    expect(heading().textContent).toContain('right now');
    expect(screen.queryAllByRole('button', { pressed: true })).toEqual([]);
  });

  it('goes back without losing the answer, and on again without giving it a second time', async () => {
    await show();
    await press('4');
    await press('Back');
    expect(screen.getByRole('button', { name: '4', pressed: true })).toBeDefined();
    await press('Next');
    expect(heading().textContent).toContain('worst pain');
  });

  it('cannot say "none of these" while something is ticked', async () => {
    await show(aDraft({ at: 'anything-else' }));
    await press(/Leg/);
    await tick('One calf sore or swollen');
    expect(screen.getByRole('button', { name: 'None of these' })).toHaveProperty('disabled', true);
  });

  it('keeps what was just answered out of the dock, which must not cover "none of these"', async () => {
    await show();
    await press('4');
    expect(screen.getByRole('status').closest('[data-dock]')).toBeNull();
    expect(screen.getByRole('button', { name: 'Undo' }).closest('[data-dock]')).toBeNull();
  });

  it('tells back in the words of the tile what no other rule grades', async () => {
    serve({ 'POST /api/check-ins': ({ body }) => checkInReceipt(body) });
    const { answers } = reviewed();
    await show({
      ...reviewed(),
      answers: { ...answers, symptomsNone: undefined, symptoms: ['hand-stiff', 'call-me'] },
    });
    await press('Send');
    await screen.findByRole('heading', { name: 'Thank you, Ines' });
    expect(screen.getByText(/^Hand stiff; Please call me\.$/)).toBeDefined();
  });

  it('keeps each answer on the device under the person’s own name', async () => {
    await show();
    await press('4');
    const keys = Object.keys(sessionStorage);
    expect(keys).toEqual([`espalier-data:${ines.personId}:check-in`]);
    expect(localStorage.getItem(keys[0]!)).toBeNull();
  });

  it('is sent from the review, and what was kept goes with it', async () => {
    const sent = serve({
      'POST /api/check-ins': ({ body }) => checkInReceipt(body),
    });
    await show(reviewed());
    await press('Send');
    expect(await screen.findByRole('heading', { name: 'Thank you, Ines' })).toBeDefined();
    expect(screen.getByText('Nothing in your answers needs a call today.')).toBeDefined();
    expect(sent).toHaveLength(1);
    expect(Object.keys(sessionStorage)).toEqual([]);
  });

  it('changes one answer from the review and comes back to it', async () => {
    await show(reviewed());
    await press(/Change: How is the swelling/);
    await press('Less');
    expect(heading().textContent).toContain('Anything to add?');
    expect(screen.getByText('Less')).toBeDefined();
  });

  it('says that nothing was sent when the line is lost, keeps all, and repeats under the same id', async () => {
    let online = false;
    const sent = serve({
      'POST /api/check-ins': ({ body }) => (online ? checkInReceipt(body) : lost),
    });
    await show(reviewed());
    await press('Send');
    expect(await screen.findByText(/Not sent yet/)).toBeDefined();
    online = true;
    await press('Send');
    await screen.findByRole('heading', { name: /Thank you/ });
    const [first, second] = sent.map(({ body }) => body as { id: string; answers: unknown });
    expect(second?.id).toBe(first?.id);
    expect(second?.answers).toEqual(first?.answers);
  });
});
