import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { AlertReceipt, PostAlert } from '#shared/check-ins/contract.ts';
import { createAlertOutbox } from '#src/features/check-ins/alert-outbox.ts';
import type { OutgoingAlert } from '#src/features/check-ins/alert-outbox.ts';
import { ApiProblem, Unreachable } from '#src/lib/problem.ts';

const alert: Omit<PostAlert, 'sentAt'> = {
  id: '0d6f3a51-7c0c-4a2b-9c53-1d3ad1a1e001',
  checkInId: 'a3c0a6f4-2f0f-4f0c-9d36-0a1f5ad7a111',
  answers: { danger: ['cold-hand'] },
  answeredAt: '2026-12-01T08:40:00.000Z',
  rulesVersion: 'shipped-1',
};

const receiptFor = ({ id, checkInId }: { id: string; checkInId: string }): AlertReceipt => ({
  id,
  checkInId,
  receivedAt: '2026-12-01T08:41:00.000Z',
  seen: null,
});

const refusal = new ApiProblem({
  type: 'urn:espalier:problem:invalid-input',
  title: 'Something in this form is not right.',
  status: 422,
});

function setUp({ waiting = [] as OutgoingAlert[] } = {}) {
  const postAlert = vi.fn(async (body: PostAlert) => receiptFor(body));
  const postMistake = vi.fn(async () => ({}));
  const kept: OutgoingAlert[][] = [];
  const signedIn = { value: true };
  const outbox = createAlertOutbox({
    postAlert,
    postMistake,
    isSignedIn: () => signedIn.value,
    read: () => waiting,
    keep: (entries) => kept.push(entries),
  });
  return { outbox, postAlert, postMistake, kept, signedIn };
}

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

describe('the alert outbox', () => {
  it('sends at once, and holds the receipt only when the server has answered', async () => {
    const { outbox, kept } = setUp();
    outbox.add(alert, 0);
    expect(outbox.entries()[0]?.receipt).toBeNull();
    await vi.advanceTimersByTimeAsync(0);
    expect(outbox.entries()[0]?.receipt).toEqual(receiptFor(alert));
    expect(kept.at(-1)).toEqual([]);
  });

  it('tries again after 1, 2, 4, 8 and then every 15 seconds, always under the same id', async () => {
    const { outbox, postAlert } = setUp();
    postAlert.mockRejectedValue(new Unreachable());
    outbox.add(alert, 0);
    await vi.advanceTimersByTimeAsync(0);
    for (const [index, seconds] of [1, 2, 4, 8, 15, 15].entries()) {
      await vi.advanceTimersByTimeAsync(seconds * 1_000 - 1);
      expect(postAlert).toHaveBeenCalledTimes(index + 1);
      await vi.advanceTimersByTimeAsync(1);
      expect(postAlert).toHaveBeenCalledTimes(index + 2);
    }
    expect(new Set(postAlert.mock.calls.map(([body]) => body.id))).toEqual(new Set([alert.id]));
  });

  it('keeps what waits on the device, and a later visit sends it', async () => {
    const first = setUp();
    first.postAlert.mockRejectedValue(new Unreachable());
    first.outbox.add(alert, 0);
    await vi.advanceTimersByTimeAsync(0);
    const waiting = first.kept.at(-1)!;
    expect(waiting.map((entry) => entry.alert.id)).toEqual([alert.id]);

    const later = setUp({ waiting });
    later.outbox.start();
    await vi.advanceTimersByTimeAsync(0);
    expect(later.postAlert).toHaveBeenCalledOnce();
    expect(later.kept.at(-1)).toEqual([]);
  });

  it('sends nothing while its person is not the one who is signed in', async () => {
    const { outbox, postAlert, signedIn } = setUp();
    signedIn.value = false;
    outbox.add(alert, 0);
    await vi.advanceTimersByTimeAsync(60_000);
    expect(postAlert).not.toHaveBeenCalled();
    signedIn.value = true;
    outbox.start();
    await vi.advanceTimersByTimeAsync(0);
    expect(postAlert).toHaveBeenCalledOnce();
  });

  it('reports a mistake after the alert, also when the alert itself was still waiting', async () => {
    const { outbox, postAlert, postMistake } = setUp();
    postAlert.mockRejectedValueOnce(new Unreachable());
    outbox.add(alert, 0);
    await vi.advanceTimersByTimeAsync(0);
    const mistake = { id: 'mistake-1', answeredAt: '2026-12-01T08:42:00.000Z' };
    outbox.reportMistake(alert.id, mistake, 0);
    await vi.advanceTimersByTimeAsync(0);
    await vi.advanceTimersByTimeAsync(15_000);
    expect(postMistake).toHaveBeenCalledExactlyOnceWith(alert.id, mistake);
    expect(postAlert.mock.invocationCallOrder.at(-1)).toBeLessThan(postMistake.mock.invocationCallOrder[0]!);
  });

  it('reports a mistake about an alert that an earlier visit delivered, and keeps trying until it is accepted', async () => {
    const { outbox, postAlert, postMistake, kept } = setUp();
    postMistake.mockRejectedValueOnce(new Unreachable());
    const mistake = { id: 'mistake-1', answeredAt: '2026-12-01T08:42:00.000Z' };
    outbox.reportMistake(alert.id, mistake, 0);
    await vi.advanceTimersByTimeAsync(0);
    const waiting = kept.at(-1)!;
    expect(waiting.map((entry) => entry.alert.id)).toEqual([alert.id]);

    // What waits survives one more reload.
    const later = setUp({ waiting });
    later.outbox.start();
    await vi.advanceTimersByTimeAsync(0);
    expect(later.postMistake).toHaveBeenCalledExactlyOnceWith(alert.id, expect.objectContaining(mistake));
    expect(later.kept.at(-1)).toEqual([]);

    await vi.advanceTimersByTimeAsync(1_000);
    expect(postMistake).toHaveBeenCalledTimes(2);
    expect(kept.at(-1)).toEqual([]);
    expect(postAlert).not.toHaveBeenCalled();
    expect(later.postAlert).not.toHaveBeenCalled();
  });

  it('says so when the server refuses for good, and goes on with the next alert', async () => {
    const { outbox, postAlert } = setUp();
    postAlert.mockRejectedValueOnce(refusal);
    outbox.add(alert, 0);
    outbox.add({ ...alert, id: 'another' }, 0);
    await vi.advanceTimersByTimeAsync(0);
    expect(outbox.entries().map(({ refused, receipt }) => [refused, receipt !== null])).toEqual([
      [true, false],
      [false, true],
    ]);
  });
});
