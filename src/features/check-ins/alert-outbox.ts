import type { AlertReceipt, PostAlert } from '#shared/check-ins/contract.ts';
import { mayPassLater, ApiProblem } from '#src/lib/problem.ts';
import { createSignal } from '#src/lib/signal.ts';

type Mistake = { id: string; answeredAt: string };

/** An alert on its way to the clinic, or a mistake on its way after an alert that the clinic has. */
export type OutgoingAlert = {
  /** Only the id where an earlier visit has delivered the alert: the device does not keep it any longer. */
  alert: Omit<PostAlert, 'sentAt'> | Pick<PostAlert, 'id'>;
  /** When it was ticked, by the server's clock as far as it is known here: from here the wait is counted. */
  tickedAtMs: number;
  receipt: AlertReceipt | null;
  /** The server refused it for good. It should not happen; the screen then says to call. */
  refused: boolean;
  mistake: (Mistake & { sent: boolean }) | null;
};

type Ports = {
  postAlert: (body: PostAlert) => Promise<AlertReceipt>;
  postMistake: (alertId: string, mistake: Mistake) => Promise<unknown>;
  /** Whether the person whose alerts these are is the one who is signed in. Nothing is sent as somebody else. */
  isSignedIn: () => boolean;
  read: () => OutgoingAlert[];
  keep: (waiting: OutgoingAlert[]) => void;
};

const firstDelayMs = 1_000;
const longestDelayMs = 15_000;

/** Whether the server has the alert itself. */
export const isReceived = ({ alert, receipt }: Pick<OutgoingAlert, 'alert' | 'receipt'>): boolean =>
  receipt !== null || !('answers' in alert);

const isDone = (entry: OutgoingAlert): boolean =>
  entry.refused || (isReceived(entry) && (entry.mistake === null || entry.mistake.sent));

export type AlertOutbox = ReturnType<typeof createAlertOutbox>;

/**
 * Sends alerts until the server has accepted each: again after 1, 2, 4, 8 and then every 15 seconds, and at once
 * when the network comes back. What waits is kept on the device, and a repeat carries the same id.
 */
export function createAlertOutbox({ postAlert, postMistake, isSignedIn, read, keep }: Ports) {
  let entries: readonly OutgoingAlert[] = read();
  let running = false;
  let failures = 0;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const changed = createSignal<void>();

  function set(next: readonly OutgoingAlert[]) {
    entries = next;
    keep(entries.filter((entry) => !isDone(entry)));
    changed.emit();
  }
  function update(id: string, part: (entry: OutgoingAlert) => Partial<OutgoingAlert>) {
    set(entries.map((entry) => (entry.alert.id === id ? { ...entry, ...part(entry) } : entry)));
  }

  async function sendOne({ alert, receipt, mistake }: OutgoingAlert) {
    if (!receipt && 'answers' in alert) {
      const accepted = await postAlert({ ...alert, sentAt: new Date().toISOString() });
      update(alert.id, () => ({ receipt: accepted }));
    }
    // A mistake that was reported while the alert was on its way is seen on the next round.
    if (mistake && !mistake.sent) {
      await postMistake(alert.id, { id: mistake.id, answeredAt: mistake.answeredAt });
      update(alert.id, () => ({ mistake: { ...mistake, sent: true } }));
    }
  }

  async function run() {
    running = true;
    clearTimeout(timer);
    let failed = false;
    for (;;) {
      // Read anew each time: alerts and mistakes may have been added while one was on its way.
      const waiting = entries.find((entry) => !isDone(entry));
      if (!waiting || !isSignedIn()) break;
      try {
        await sendOne(waiting);
        failures = 0;
      } catch (error) {
        const again = mayPassLater(error) || isSessionTrouble(error);
        if (!again) update(waiting.alert.id, () => ({ refused: true }));
        failed ||= again;
        if (again) break;
      }
    }
    running = false;
    if (failed) {
      timer = setTimeout(start, Math.min(firstDelayMs * 2 ** failures, longestDelayMs));
      failures += 1;
    }
  }
  function start() {
    if (!running) void run();
  }

  return {
    /** Every alert of this visit, sent or not. */
    entries: () => entries,
    subscribe: changed.subscribe,
    add(alert: Omit<PostAlert, 'sentAt'>, tickedAtMs: number) {
      set([...entries, { alert, tickedAtMs, receipt: null, refused: false, mistake: null }]);
      failures = 0;
      start();
    },
    /** Also for an alert that an earlier visit delivered: then nothing of it is left here but its id. */
    reportMistake(alertId: string, mistake: Mistake, reportedAtMs: number) {
      const pending = { ...mistake, sent: false };
      if (entries.some(({ alert }) => alert.id === alertId)) update(alertId, () => ({ mistake: pending }));
      else {
        const alert = { id: alertId };
        set([
          ...entries,
          { alert, tickedAtMs: reportedAtMs, receipt: null, refused: false, mistake: pending },
        ]);
      }
      failures = 0;
      start();
    },
    /** At start, after a sign-in and when the network comes back. */
    start() {
      failures = 0;
      start();
    },
  };
}

/** A session that has just been renewed in another tab: the token is fetched anew, and the next try may pass. */
const isSessionTrouble = (error: unknown): boolean =>
  error instanceof ApiProblem && (error.code === 'not-signed-in' || error.code === 'foreign-request');
