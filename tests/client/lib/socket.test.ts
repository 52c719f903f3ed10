import { describe, expect, it, vi } from 'vitest';
import { createCatchUp } from '#src/lib/socket.ts';

/** Fetches that end when the test says so. */
function held() {
  const asked: string[] = [];
  const ends: (() => void)[] = [];
  const catchUp = createCatchUp((prefix) => {
    asked.push(prefix);
    return new Promise<void>((resolve) => ends.push(resolve));
  });
  return { asked, catchUp, endAll: () => ends.splice(0).forEach((end) => end()) };
}

describe('catching up after hints', () => {
  it('fetches only what a hint’s topic touches', () => {
    const { asked, catchUp } = held();
    catchUp({ topic: 'thread', threadId: 't', sequence: 3 });
    expect(asked).toEqual(['threads', 'today', 'flags']);
  });

  it('has one round in flight, and gathers a burst of hints into one more', async () => {
    const { asked, catchUp, endAll } = held();
    catchUp({ topic: 'flags', flagId: 'f1' });
    for (let hint = 0; hint < 20; hint += 1) catchUp({ topic: 'flags', flagId: `f${hint}` });
    expect(asked).toEqual(['flags', 'today']);
    endAll();
    await vi.waitFor(() => expect(asked).toEqual(['flags', 'today', 'flags', 'today']));
  });

  it('goes on with later hints after a fetch has failed', async () => {
    const asked: string[] = [];
    const catchUp = createCatchUp((prefix) => {
      asked.push(prefix);
      return Promise.reject(new Error('no line'));
    });
    catchUp({ topic: 'today' });
    catchUp({ topic: 'alert', alertId: 'a' });
    await vi.waitFor(() => expect(asked).toContain('alerts'));
  });
});
