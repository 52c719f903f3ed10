import { useEffect, useRef } from 'react';
import { Link } from 'react-router-dom';
import type { FlagRow } from '#shared/triage/contract.ts';
import { Sparkline } from '#src/components/Sparkline.tsx';
import { classNames } from '#src/components/class-names.ts';
import { Tag } from '#src/components/Tag.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { CalledMistake } from './CalledMistake.tsx';
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
        'relative border-b border-l-3 border-wire py-3 pr-5 pl-4 leading-snug',
        'has-focus-visible:outline-3 has-focus-visible:-outline-offset-3 has-focus-visible:outline-focus',
        selected ? 'border-l-leaf bg-sheet' : 'border-l-transparent hover:bg-bark-wash',
      )}
    >
      <div className="flex items-baseline justify-between gap-3">
        <div className="flex min-w-0 flex-wrap items-baseline gap-x-2">
          <h3 className="min-w-0 text-base tracking-normal">
            <Link
              id={rowLinkId(flag.id)}
              to={`/round/${flag.id}`}
              className="after:absolute after:inset-0 focus-visible:outline-none"
            >
              {patient.name}
            </Link>
          </h3>
          <span className="text-sm text-ink-soft">{shortOperation(patient)}</span>
        </div>
        <p className="shrink-0 text-sm text-ink-soft">
          <span className="sr-only">Raised </span>
          {formatMoment(flag.raisedAt, nowMs, timeZone)}
        </p>
      </div>
      <div className="mt-0.5 flex items-start justify-between gap-3">
        <div className="min-w-0">
          <p>
            {isNew ? (
              <>
                <Tag tone="leaf">New</Tag>{' '}
              </>
            ) : null}
            {flag.headline}
          </p>
          <CalledMistake flag={flag} timeZone={timeZone} nowMs={nowMs} />
          {claimedBy && claimedAt ? (
            <p className="mt-1 text-sm text-ink-soft">
              {claimedBy.personId === meId ? 'You have it' : `${claimedBy.name} has it`}&nbsp;· since{' '}
              {formatMoment(claimedAt, nowMs, timeZone)}
            </p>
          ) : null}
        </div>
        <div className="w-24 shrink-0">
          <Sparkline
            values={flag.pain14}
            reference={flag.usualPain ?? undefined}
            tone={painTone(flag.pain14, flag.usualPain)}
            label={seriesInWords('Pain now', flag.pain14, flag.usualPain)}
          />
        </div>
      </div>
    </li>
  );
}
