import { act, screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import type { FlagCase } from '#shared/triage/contract.ts';
import { CasePane } from '#src/features/triage/CasePane.tsx';
import { noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import { aCase, callum, flagId, noor } from './flags.ts';

const nowMs = Date.parse('2026-12-01T12:30:00.000Z');
const casePath = `/api/flags/${flagId}`;
const heldBy = (person: typeof noor): Partial<FlagCase> => ({
  state: 'claimed',
  claimedBy: person,
  claimedAt: '2026-12-01T12:02:00.000Z',
});

/** Without the waiting between two keys that a person needs. */
const user = userEvent.setup({ delay: null });

// The form is a chunk of its own; how long it takes to arrive is not what is tested here.
beforeAll(() => import('#src/features/triage/CloseFlagDialog.tsx'));

let current: FlagCase;
beforeEach(() => {
  sessionStorage.clear();
  current = aCase();
});

function serveCase(more: Parameters<typeof serve>[0] = {}) {
  return serve({
    [`GET ${casePath}`]: () => current,
    [`POST ${casePath}/seen`]: () => undefined,
    ...more,
  });
}
const show = () => showTo(noorSignedIn, <CasePane flagId={flagId} nowMs={nowMs} />);

describe('an open case', () => {
  it('is recorded as seen once, however often it is fetched again', async () => {
    const sent = serveCase();
    const { queryClient } = await show();
    await screen.findByRole('heading', { name: /Tobias Ahlgren/ });
    await act(() => queryClient.invalidateQueries());
    await waitFor(() => expect(sent.filter(({ path }) => path === casePath)).toHaveLength(2));
    expect(sent.filter(({ path }) => path === `${casePath}/seen`)).toHaveLength(1);
  });

  it('is recorded as seen again when it was raised again while it is on the screen', async () => {
    const sent = serveCase();
    const { queryClient } = await show();
    await screen.findByRole('heading', { name: /Tobias Ahlgren/ });
    const seen = () => sent.filter(({ path }) => path === `${casePath}/seen`);
    const at = '2026-12-01T12:20:00.000Z';
    const seenEvent = { id: 'e2', kind: 'seen' as const, at, by: noor.name, detail: null, note: null };
    current = aCase({ events: [...current.events, seenEvent] });
    await act(() => queryClient.invalidateQueries());
    await screen.findByText('Seen by Noor Haddad');
    expect(seen(), 'other events do not count').toHaveLength(1);
    const again = { ...seenEvent, id: 'e3', kind: 'raised-again' as const, by: null };
    current = aCase({ urgency: 'emergency', events: [...current.events, again] });
    await act(() => queryClient.invalidateQueries());
    await waitFor(() => expect(seen()).toHaveLength(2));
  });

  it('says above the reasons that the patient called a tick a mistake', async () => {
    current = aCase({ calledMistakeAt: '2026-12-01T07:08:00.000Z' });
    serveCase();
    await show();
    const said = await screen.findByText('The patient says: ticked by mistake, 02:08.');
    const reason = screen.getByRole('heading', { name: /Fall with injury/ });
    expect(said.compareDocumentPosition(reason)).toBe(Node.DOCUMENT_POSITION_FOLLOWING);
  });

  it('gives its reason with the rule, its version and its source, and the safety facts', async () => {
    serveCase();
    await show();
    expect(await screen.findByText(/pain is 8, which is 5 above the usual 3/)).toBeTruthy();
    expect(screen.getByText(/Rule fall-with-injury, version 1\./)).toBeTruthy();
    expect(screen.getByText(/Source: Default of ours/)).toBeTruthy();
    expect(screen.getByText(/Takes a blood thinner: apixaban/)).toBeTruthy();
    expect(screen.getByRole('link', { name: '555-0143' }).getAttribute('href')).toBe('tel:5550143');
  });

  it('says who has it when a colleague’s claim came first, and shows their claim', async () => {
    serveCase({
      [`POST ${casePath}/claim`]: () => {
        current = aCase(heldBy(callum));
        return new Problem('claimed-by-other', undefined, { claimedBy: callum.name });
      },
    });
    await show();
    await user.click(await screen.findByRole('button', { name: 'Claim' }));
    expect((await screen.findByRole('alert')).textContent).toContain('Callum Reyes has claimed this flag.');
    expect(screen.queryByRole('button', { name: 'Claim' })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Close with an outcome' })).toBeNull();
  });

  it('keeps a reply that was refused, and sends it again under the same id', async () => {
    const answers = [
      () => new Problem('unavailable'),
      () => {
        current = aCase(heldBy(noor));
        return { threadId: flagId, messageId: flagId, sequence: 1 };
      },
    ];
    const sent = serveCase({ [`POST ${casePath}/replies`]: () => answers.shift()?.() });
    await show();
    await user.click(await screen.findByRole('button', { name: 'Reply to Tobias' }));
    const box = screen.getByRole<HTMLTextAreaElement>('textbox', { name: 'Reply to Tobias' });
    await user.click(box);
    await user.paste('Keep the sling on.');
    await user.click(screen.getByRole('button', { name: 'Send' }));
    expect((await screen.findByRole('alert')).textContent).toContain('Your text is kept here.');
    expect(box.value).toBe('Keep the sling on.');
    await user.click(screen.getByRole('button', { name: 'Send' }));
    await waitFor(() => expect(screen.queryByRole('textbox')).toBeNull());
    const [first, second] = sent.filter(({ path }) => path.endsWith('/replies'));
    expect(second?.body).toEqual(first?.body);
  });

  it('says that a colleague has closed it meanwhile, and keeps the reply that was being written', async () => {
    serveCase();
    const { queryClient } = await show();
    await user.click(await screen.findByRole('button', { name: 'Reply to Tobias' }));
    await user.click(screen.getByRole('textbox'));
    await user.paste('Please call');
    current = aCase({
      state: 'closed',
      outcome: 'advised-by-phone',
      events: [
        {
          id: 'e2',
          kind: 'closed',
          at: '2026-12-01T12:20:00.000Z',
          by: callum.name,
          detail: 'advised-by-phone',
          note: null,
        },
      ],
    });
    await act(() => queryClient.invalidateQueries());
    expect(await screen.findByText('Callum Reyes closed this flag at 07:20: advised by phone.')).toBeTruthy();
    expect(screen.getByRole<HTMLTextAreaElement>('textbox').value).toBe('Please call');
  });
});

describe('closing a flag', () => {
  async function openForm(more: Parameters<typeof serve>[0] = {}) {
    const sent = serveCase(more);
    await show();
    await user.click(await screen.findByRole('button', { name: 'Close with an outcome' }));
    await screen.findByRole('dialog');
    return sent;
  }
  const choose = (name: string) => user.click(screen.getByLabelText(name));
  const submit = () => user.click(screen.getByText('Close the flag'));

  it('asks for an outcome, and for the words that some outcomes need, and sends nothing before', async () => {
    const sent = await openForm();
    await submit();
    expect(await screen.findByText('Choose an outcome.')).toBeTruthy();
    expect(screen.getByText('Say whether it was worth raising.')).toBeTruthy();
    await choose('No action needed');
    await choose('No');
    await submit();
    await waitFor(() =>
      expect(screen.getByRole('textbox').getAttribute('aria-invalid'), 'the note is asked for').toBe('true'),
    );
    expect(sent.filter(({ path }) => path.endsWith('/close'))).toEqual([]);
  });

  it('puts what the server refused beside its field and keeps what was chosen', async () => {
    await openForm({
      [`POST ${casePath}/close`]: () =>
        new Problem('invalid-input', undefined, { errors: [{ field: 'note', message: 'Name who it was.' }] }),
    });
    await choose('Advised by phone');
    await choose('Yes');
    await submit();
    expect(await screen.findByText('Name who it was.')).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>('Advised by phone').checked).toBe(true);
  });
});
