import { compareUrgency, urgencies } from '#shared/red-flags/findings.ts';
import type { Urgency } from '#shared/red-flags/findings.ts';
import type { FlagRow } from '#shared/triage/contract.ts';

export type QueueGroup = { urgency: Urgency; flags: FlagRow[] };

type Ordered = Pick<FlagRow, 'id' | 'urgency' | 'raisedAt'>;

/** The most urgent first, then whoever has waited longest; the id settles a tie, so that rows never swap. */
function compareRows(a: Ordered, b: Ordered): number {
  return (
    compareUrgency(a.urgency, b.urgency) ||
    Date.parse(a.raisedAt) - Date.parse(b.raisedAt) ||
    a.id.localeCompare(b.id)
  );
}

/** The queue under its headings; an urgency with nothing to see has none. */
export function groupQueue(flags: readonly FlagRow[]): QueueGroup[] {
  const ordered = [...flags].sort(compareRows);
  return urgencies
    .map((urgency) => ({ urgency, flags: ordered.filter((flag) => flag.urgency === urgency) }))
    .filter((group) => group.flags.length > 0);
}

/**
 * The flag that a step down (1) or up (-1) leads to, and null at the ends. From nowhere a step down leads to
 * the first. A flag that has left the queue still has its place there, so the step goes to its old neighbour.
 */
export function stepInQueue(flags: readonly FlagRow[], from: Ordered | null, step: 1 | -1): FlagRow | null {
  const ordered = [...flags].sort(compareRows);
  if (!from) return step === 1 ? (ordered[0] ?? null) : null;
  const others = ordered.filter((flag) => flag.id !== from.id);
  return (
    (step === 1
      ? others.find((flag) => compareRows(flag, from) > 0)
      : others.findLast((flag) => compareRows(flag, from) < 0)) ?? null
  );
}
