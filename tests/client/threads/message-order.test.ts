import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Message } from '#shared/threads/contract.ts';
import { catchUpMessages, mergeBySequence, withoutGap } from '#src/features/threads/message-order.ts';
import { aMessage } from './threads.ts';

const sequencesOf = (messages: readonly Message[]) => messages.map(({ sequence }) => sequence);
const range = (from: number, to: number) =>
  Array.from({ length: to - from + 1 }, (_, index) => aMessage({ sequence: from + index }));

describe('merging messages', () => {
  it('stands each message once, in the order of its sequence, whatever arrives when', () => {
    fc.assert(
      fc.property(fc.array(fc.array(fc.integer({ min: 1, max: 30 }))), (arrivals) => {
        const merged = arrivals.reduce<Message[]>(
          (known, sequences) =>
            mergeBySequence(
              known,
              sequences.map((sequence) => aMessage({ sequence })),
            ),
          [],
        );
        expect(sequencesOf(merged)).toEqual([...new Set(arrivals.flat())].sort((a, b) => a - b));
      }),
    );
  });

  it('shows nothing behind a gap, so that a message on the screen never moves', () => {
    fc.assert(
      fc.property(fc.uniqueArray(fc.integer({ min: 1, max: 20 })), (sequences) => {
        let known: Message[] = [];
        let shown: number[] = [];
        for (const sequence of sequences) {
          known = mergeBySequence(known, [aMessage({ sequence })]);
          const now = sequencesOf(withoutGap(known));
          // What was shown is still there, in the same places.
          expect(now.slice(0, shown.length)).toEqual(shown);
          shown = now;
        }
      }),
    );
  });
});

describe('catching up', () => {
  /** A server that gives pages of three and notes what it was asked. */
  function serverWith(lastSequence: number) {
    const asked: number[] = [];
    return {
      asked,
      page: (after: number) => {
        asked.push(after);
        return Promise.resolve({
          messages: range(after + 1, Math.min(after + 3, lastSequence)),
          lastSequence,
        });
      },
    };
  }

  it('fetches page after page until the last message is there', async () => {
    const server = serverWith(8);
    const messages = await catchUpMessages([], server.page);
    expect(sequencesOf(messages)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
    expect(server.asked).toEqual([0, 3, 6]);
  });

  it('asks only for what comes after the last message that it has', async () => {
    const server = serverWith(5);
    await catchUpMessages(range(1, 4), server.page);
    expect(server.asked).toEqual([4]);
  });

  it('fills a gap that a message of one’s own has left', async () => {
    const server = serverWith(6);
    const messages = await catchUpMessages([...range(1, 2), aMessage({ sequence: 6 })], server.page);
    expect(server.asked[0]).toBe(2);
    expect(sequencesOf(messages)).toEqual([1, 2, 3, 4, 5, 6]);
  });

  it('ends when an answer brings nothing on, though it names more', async () => {
    const messages = await catchUpMessages(range(1, 2), () =>
      Promise.resolve({ messages: [], lastSequence: 9 }),
    );
    expect(sequencesOf(messages)).toEqual([1, 2]);
  });
});
