import { useEffect, useRef } from 'react';
import { Link } from 'react-router-dom';
import type { FlagRow } from '#shared/triage/contract.ts';
import { Sparkline } from '#src/components/Sparkline.tsx';
import { classNames } from '#src/components/class-names.ts';
import { Tag } from '#src/components/Tag.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { seriesInWords, shortOperation } from './words.ts';
import { painTone } from './pain-tone.ts';

type Props = {
  flag: FlagRow;
  selected: boolean;
  isNew: boolean;
  meId: string;
  timeZone: string;
  nowMs: number;
};

/** The id of the link in a flag's row, for whoever comes back from the case. */
export const rowLinkId = (flagId: string): string => `flag-${flagId}`;

/** One flag of the queue. The whole row is the link's target, but only its name is the link's name. */
export function QueueRow({ flag, selected, isNew, meId, timeZone, nowMs }: Props) {
  const { patient, claimedBy, claimedAt } = flag;
  const row = useRef<HTMLLIElement>(null);
  useEffect(() => {
    if (selected) row.current?.scrollIntoView({ block: 'nearest' });
  }, [selected]);
  return (
    <li
      ref={row}
      aria-current={selected ? 'true' : undefined}
      className={classNames(
        'relative grid grid-cols-[minmax(0,1fr)_auto] gap-x-4 gap-y-0.5 border-b border-l-3 border-wire py-3 pr-5 pl-4 leading-snug',
        'has-focus-visible:outline-3 has-focus-visible:-outline-offset-3 has-focus-visible:outline-focus',
        selected ? 'border-l-leaf bg-sheet' : 'border-l-transparent hover:bg-bark-wash',
      )}
    >
      <div className="min-w-0">
        <h3 className="inline text-base tracking-normal">
          <Link
            id={rowLinkId(flag.id)}
            to={`/round/${flag.id}`}
            className="after:absolute after:inset-0 focus-visible:outline-none"
          >
            {patient.name}
          </Link>
        </h3>{' '}
        <span className="text-sm text-ink-soft">· {shortOperation(patient)}</span>
      </div>
      <p className="text-right text-sm text-ink-soft">
        <span className="sr-only">Raised </span>
        {formatMoment(flag.raisedAt, nowMs, timeZone)}
      </p>
      <div className="min-w-0">
        <p>
          {isNew ? (
            <span className="mr-2">
              <Tag tone="leaf">New</Tag>
            </span>
          ) : null}
          {flag.headline}
        </p>
        {claimedBy && claimedAt ? (
          <p className="mt-1 text-sm text-ink-soft">
            {claimedBy.personId === meId ? 'You have it' : `${claimedBy.name} has it`} · since{' '}
            {formatMoment(claimedAt, nowMs, timeZone)}
          </p>
        ) : null}
      </div>
      <div className="w-24 justify-self-end">
        <Sparkline
          values={flag.pain14}
          reference={flag.usualPain ?? undefined}
          tone={painTone(flag.pain14, flag.usualPain)}
          label={seriesInWords('Pain now', flag.pain14, flag.usualPain)}
        />
      </div>
    </li>
  );
}
