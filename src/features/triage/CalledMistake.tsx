import type { FlagRow } from '#shared/triage/contract.ts';
import { formatMoment } from '#src/lib/format.ts';

type Props = { flag: Pick<FlagRow, 'calledMistakeAt'>; timeZone: string; nowMs: number };

/** The patient's word that a tick was a mistake. It is shown beside the flag and never takes its place. */
export function CalledMistake({ flag: { calledMistakeAt }, timeZone, nowMs }: Props) {
  if (calledMistakeAt === null) return null;
  return (
    <p className="my-1 text-sm font-bold">
      The patient says: ticked by mistake, {formatMoment(calledMistakeAt, nowMs, timeZone)}.
    </p>
  );
}
