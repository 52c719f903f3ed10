import type { FlagCase } from '#shared/triage/contract.ts';
import { Banner } from '#src/components/Banner.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { outcomeWords } from './words.ts';

type Props = { flag: FlagCase; meName: string; timeZone: string; nowMs: number };

/** Who closed the flag, when and how; it is announced, since a colleague may close it while it is open here. */
export function ClosedNotice({ flag, meName, timeZone, nowMs }: Props) {
  const closing = flag.events.findLast((event) => event.kind === 'closed');
  const by = closing?.by ?? null;
  const at = closing ? formatMoment(closing.at, nowMs, timeZone) : '';
  const who = by === meName ? 'You' : (by ?? 'Someone');
  return (
    // The live region stands empty until then, or what arrives in it is not announced.
    <div role="status">
      {flag.state === 'closed' ? (
        <Banner
          title={`${who} closed this flag${at === '' ? '' : ` at ${at}`}${
            flag.outcome === null ? '.' : `: ${outcomeWords[flag.outcome].toLowerCase()}.`
          }`}
        >
          A text that you were writing is kept.
        </Banner>
      ) : null}
    </div>
  );
}
