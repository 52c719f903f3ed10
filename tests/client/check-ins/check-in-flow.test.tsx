import { screen, waitFor, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { Me } from '#shared/accounts/contract.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { CheckInFlow } from '#src/features/check-ins/CheckInFlow.tsx';
import type { CheckInDraft } from '#src/features/check-ins/draft.ts';
import { checkInWords } from '#src/features/check-ins/word-files.ts';
import { loadWords, startI18n } from '#src/lib/i18n.ts';
import { lost, noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import { aDraft } from './drafts.ts';

const user = userEvent.setup({ delay: null });

let personCount = 0;
let ines: Me;

beforeEach(async () => {
  sessionStorage.clear();
  localStorage.clear();
  vi.spyOn(window, 'scrollTo').mockImplementation(() => undefined);
  // A person of her own for each test, since the outbox of alerts lives as long as the tab.
  personCount += 1;
  ines = {
    ...noorSignedIn,
    personId: `5b1f6a54-58a0-4f0e-9a5b-0000000000${10 + personCount}`,
    name: 'Ines Valcourt',
    roles: ['patient'],
    // She did not choose to stay signed in, so nothing may outlive the tab.
    session: { idleEndsAt: '2026-12-01T09:10:00.000Z', endsAt: '2026-12-02T07:00:00.000Z' },
    patient: { id: '0f3a7c1e-6a52-4f0b-8a44-3b6f6b0f2a11', arm: 'left', controlsTowards: 'right' },
  };
  await startI18n();
  await loadWords(checkInWords);
});

async function show(start: CheckInDraft = aDraft()) {
  const shown = await showTo(ines, <CheckInFlow start={start} firstName="Ines" />);
  shown.queryClient.setQueryData(sessionQuery.queryKey, { me: ines });
  return shown;
}

const heading = () => screen.getByRole('heading', { level: 1 });
const press = (name: string | RegExp) => user.click(screen.getByRole('button', { name }));
const tick = (name: string | RegExp) => user.click(screen.getByRole('checkbox', { name }));
const receipt = (body: unknown) => {
  const { id, checkInId } = body as { id: string; checkInId: string };
  return { id, checkInId, receivedAt: '2026-12-01T08:41:00.000Z', seen: null };
};
const json = (body: unknown) =>
  new Response(JSON.stringify(body), { headers: { 'content-type': 'application/json' } });
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

  it('keeps each answer on the device under the person’s own name', async () => {
    await show();
    await press('4');
    const keys = Object.keys(sessionStorage);
    expect(keys).toEqual([`espalier-data:${ines.personId}:check-in`]);
    expect(localStorage.getItem(keys[0]!)).toBeNull();
  });

  it('is sent from the review, and what was kept goes with it', async () => {
    const sent = serve({
      'POST /api/check-ins': ({ body }) => ({
        id: (body as { id: string }).id,
        receivedAt: '2026-12-01T08:41:00.000Z',
        localDate: '2026-12-01',
        clockDoubtful: false,
      }),
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
      'POST /api/check-ins': ({ body }) =>
        online
          ? {
              id: (body as { id: string }).id,
              receivedAt: '2026-12-01T08:41:00.000Z',
              localDate: '2026-12-01',
              clockDoubtful: false,
            }
          : lost,
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
    await press('Not sure');
    expect(heading().textContent).toContain('Please talk to someone now');
    const calls = within(screen.getByRole('main')).getAllByRole('link');
    expect(calls[0]?.getAttribute('href')).toBe('tel:988');
  });
});
