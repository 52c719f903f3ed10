import { act, screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { Problem } from '#shared/problems/problems.ts';
import type { Message, ThreadDetail } from '#shared/threads/contract.ts';
import { ThreadView } from '#src/features/threads/ThreadView.tsx';
import { clinic, lost, noorSignedIn, serve, showTo } from '../clinic/screen.tsx';
import { aMessage, aThread, authors, inesId, noorId, threadId } from './threads.ts';

const path = `/api/threads/${threadId}`;
const inesSignedIn = {
  ...noorSignedIn,
  personId: inesId,
  name: 'Ines Valcourt',
  roles: ['patient' as const],
};

/** Without the waiting between two keys that a person needs. */
const user = userEvent.setup({ delay: null });

let thread: ThreadDetail;
let messages: Message[];
beforeEach(() => {
  sessionStorage.clear();
  thread = aThread();
  messages = [aMessage({ sequence: 1, text: 'Should I change it?' })];
  vi.spyOn(document, 'hasFocus').mockReturnValue(true);
  vi.stubGlobal(
    'ResizeObserver',
    class {
      observe() {}
      disconnect() {}
    },
  );
  // Everything is in view at once, as on a tall screen.
  vi.stubGlobal(
    'IntersectionObserver',
    class {
      private readonly tell: (entries: { isIntersecting: boolean }[]) => void;
      constructor(tell: (entries: { isIntersecting: boolean }[]) => void) {
        this.tell = tell;
      }
      observe() {
        this.tell([{ isIntersecting: true }]);
      }
      disconnect() {}
    },
  );
});

type PostAnswer = (sent: { body: unknown }) => unknown;

function serveThread(post: PostAnswer = () => new Problem('unavailable')) {
  return serve({
    [`GET ${path}`]: () => thread,
    [`GET ${path}/messages`]: () => ({ messages, lastSequence: messages.length }),
    [`POST ${path}/messages`]: post,
    [`POST ${path}/seen`]: () => ({ seenSequence: 1, seenAt: '2026-12-01T08:07:00.000Z' }),
  });
}
const showToNoor = () => showTo(noorSignedIn, <ThreadView threadId={threadId} side="clinic" />);

/** The server keeps what was posted, as it would. */
const keep = (body: unknown): Message => {
  const { id, text } = body as { id: string; text: string };
  const kept = aMessage({ sequence: messages.length + 1, author: authors.noor, clientId: id, text });
  messages = [...messages, kept];
  return kept;
};

async function write(text: string) {
  const box = await screen.findByRole<HTMLTextAreaElement>('textbox', { name: 'Write to Ines Valcourt' });
  await user.click(box);
  await user.paste(text);
  await user.click(screen.getByRole('button', { name: 'Send' }));
  return box;
}

describe('a thread', () => {
  it('shows a text as text, whatever it looks like', async () => {
    messages = [aMessage({ sequence: 1, text: '<b>wet</b>\n  and red' })];
    serveThread();
    await showToNoor();
    expect((await screen.findByText(/<b>wet<\/b>/)).textContent).toBe('<b>wet</b>\n  and red');
  });

  it('records that the newest message was on the screen', async () => {
    const sent = serveThread();
    await showToNoor();
    await waitFor(() =>
      expect(sent.find((one) => one.path === `${path}/seen`)?.body).toEqual({ sequence: 1 }),
    );
  });

  it('records nothing while the page is not before anybody', async () => {
    vi.spyOn(document, 'hasFocus').mockReturnValue(false);
    const sent = serveThread();
    await showToNoor();
    await screen.findByText('Should I change it?');
    expect(sent.filter((one) => one.path === `${path}/seen`)).toEqual([]);
  });

  it('tells when the other side saw one’s message', async () => {
    messages = [aMessage({ sequence: 1, author: authors.noor, text: 'Leave it in place.' })];
    thread = aThread({
      participants: [
        {
          personId: inesId,
          name: 'Ines Valcourt',
          side: 'patient',
          seenSequence: 1,
          seenAt: '2026-12-01T13:07:00.000Z',
        },
        { personId: noorId, name: 'Noor Haddad', side: 'clinic', seenSequence: 1, seenAt: null },
      ],
    });
    serveThread();
    await showToNoor();
    expect(await screen.findByText(/seen 08:07/)).toBeTruthy();
  });
});

describe('the composer', () => {
  it('empties once the message stands in the thread', async () => {
    serveThread(({ body }) => keep(body));
    await showToNoor();
    const box = await write('Keep it dry.');
    await waitFor(() => expect(box.value).toBe(''));
    expect(screen.getByText('Keep it dry.')).toBeTruthy();
  });

  it('keeps the text of a failed sending and repeats it under the same id', async () => {
    const answers: PostAnswer[] = [() => new Problem('unavailable'), ({ body }) => keep(body)];
    const sent = serveThread((request) => answers.shift()?.(request));
    await showToNoor();
    const box = await write('Keep it dry.');
    expect(await screen.findByText(/This is not sent yet\. Your words are kept\./)).toBeTruthy();
    expect(box.value).toBe('Keep it dry.');
    await user.click(screen.getByRole('button', { name: 'Send again' }));
    await waitFor(() => expect(box.value).toBe(''));
    const posts = sent.filter((one) => one.method === 'POST' && one.path === `${path}/messages`);
    expect(posts).toHaveLength(2);
    expect(posts[1]?.body).toEqual(posts[0]?.body);
  });

  it('takes a message as sent that turns up in the thread though its answer was lost', async () => {
    serveThread(({ body }) => {
      keep(body);
      return lost;
    });
    await showToNoor();
    const box = await write('Keep it dry.');
    await waitFor(() => expect(box.value).toBe(''));
    expect(screen.queryByText(/not sent/)).toBeNull();
    expect(screen.getAllByText('Keep it dry.')).toHaveLength(1);
  });

  it('still has the text after the page was left and opened again', async () => {
    serveThread();
    const first = await showToNoor();
    await user.click(await screen.findByRole('textbox'));
    await user.paste('Half a sen');
    first.unmount();
    await showToNoor();
    expect((await screen.findByRole<HTMLTextAreaElement>('textbox')).value).toBe('Half a sen');
  });
});

describe('a patient’s thread out of hours', () => {
  it('says before anything is sent when the clinic opens and whom to call until then', async () => {
    serveThread();
    const closed = { ...clinic, openNow: false, opensAt: '2099-12-01T13:00:00.000Z' };
    await showTo({ ...inesSignedIn, clinic: closed }, <ThreadView threadId={threadId} side="patient" />);
    expect(await screen.findByText(/The clinic is closed\. It opens Tue 08:00\./)).toBeTruthy();
    expect(screen.getByRole('link', { name: '555-0110' }).getAttribute('href')).toBe('tel:5550110');
  });
});

describe('messages that arrive', () => {
  it('are shown in order and announced when they come from the other side', async () => {
    serveThread();
    const { queryClient } = await showToNoor();
    await screen.findByText('Should I change it?');
    messages = [...messages, aMessage({ sequence: 2, text: 'It is wet again.' })];
    await act(() => queryClient.invalidateQueries());
    expect(await screen.findByText('New message from Ines Valcourt: It is wet again.')).toBeTruthy();
    const shown = screen.getAllByRole('listitem').map((item) => item.textContent ?? '');
    expect(shown.findIndex((text) => text.includes('Should I'))).toBeLessThan(
      shown.findIndex((text) => text.includes('wet again')),
    );
  });
});
