import { useMe } from '#src/app/session.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { useNowMs } from '#src/lib/now.ts';
import { useThreads } from './queries.ts';

/** "3 waiting on us · oldest since 06:58", for the head of the clinic's list. */
export function WaitingLine() {
  const { clinic } = useMe();
  const nowMs = useNowMs();
  const threads = useThreads().data;
  if (!threads) return null;
  const waiting = threads.filter(({ state }) => state === 'waiting-on-us');
  const oldest = waiting.map(({ lastAt }) => lastAt).sort()[0];
  return (
    <p className="mt-1 text-ink-soft">
      <strong className="text-ink">{waiting.length} waiting on us</strong>
      {oldest === undefined ? null : ` · oldest since ${formatMoment(oldest, nowMs, clinic.timeZone)}`}
    </p>
  );
}
