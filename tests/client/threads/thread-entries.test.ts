import { describe, expect, it } from 'vitest';
import { entriesOf } from '#src/features/threads/thread-entries.ts';
import { aMessage } from './threads.ts';

describe('the days of a thread', () => {
  it('turn at midnight of the clinic’s zone, not of the device’s', () => {
    const messages = [
      aMessage({ sequence: 1, sentAt: '2026-12-01T04:30:00.000Z' }),
      aMessage({ sequence: 2, sentAt: '2026-12-01T05:30:00.000Z' }),
    ];
    const days = entriesOf(messages, 'America/New_York').map((entry) =>
      entry.kind === 'day' ? entry.localDate : entry.message.sequence,
    );
    expect(days).toEqual(['2026-11-30', 1, '2026-12-01', 2]);
  });
});
