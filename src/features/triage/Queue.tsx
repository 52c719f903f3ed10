import { Leaf } from 'lucide-react';
import type { FlagRow } from '#shared/triage/contract.ts';
import { EmptyState } from '#src/components/EmptyState.tsx';
import { groupQueue } from './queue.ts';
import { QueueRow } from './QueueRow.tsx';
import { UrgencySign } from './UrgencySign.tsx';

type Props = {
  flags: FlagRow[];
  /** Patients who checked in today with nothing flagged. */
  quiet: number;
  selectedId: string | null;
  newIds: ReadonlySet<string>;
  meId: string;
  timeZone: string;
  nowMs: number;
};

/** The morning's flags by urgency, each group under its sign, its word and its count. */
export function Queue({ flags, quiet, selectedId, newIds, meId, timeZone, nowMs }: Props) {
  if (flags.length === 0) {
    return (
      <EmptyState icon={Leaf} title="Nothing is flagged.">
        {quiet === 1
          ? 'One person checked in today and nothing was flagged.'
          : `${quiet} people checked in today and nothing was flagged.`}{' '}
        A new flag appears here by itself.
      </EmptyState>
    );
  }
  return groupQueue(flags).map((group) => (
    <section key={group.urgency} aria-labelledby={`queue-${group.urgency}`} className="mt-5">
      <h2
        id={`queue-${group.urgency}`}
        className="flex items-center gap-1.5 border-b border-wire px-5 pb-2 text-sm tracking-normal"
      >
        <UrgencySign urgency={group.urgency} strong />
        <span>· {group.flags.length}</span>
      </h2>
      <ul>
        {group.flags.map((flag) => (
          <QueueRow
            key={flag.id}
            flag={flag}
            selected={flag.id === selectedId}
            isNew={newIds.has(flag.id)}
            meId={meId}
            timeZone={timeZone}
            nowMs={nowMs}
          />
        ))}
      </ul>
    </section>
  ));
}
