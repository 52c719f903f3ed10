import type { TrellisData, TrellisPhase } from '#shared/plans/trellis.ts';
import type { TrellisFrame } from './trellis-frame.ts';

/** The length on the wire of a phase that has no usual end: eight weeks, so that early days can be told apart. */
const openEndedDays = 56;

export type GrownPhase = { phase: TrellisPhase; opened: number; closed: number | null; spanDays: number };

/** The distance between wires and the height of each, from the lowest phase up. */
export function hangWires(
  phases: TrellisPhase[],
  highest: TrellisPhase | undefined,
  frame: TrellisFrame,
  height: number,
): { pitch: number; yOf: (phase: TrellisPhase) => number } {
  const gaps = phases.length - 1;
  const raisedFrom = highest ? phases.indexOf(highest) : 0;
  const room = height - frame.headroom - frame.footroom - (raisedFrom > 0 ? frame.roomUnderToday : 0);
  const pitch = gaps > 0 ? room / gaps : height;
  const yOf = (phase: TrellisPhase) => {
    const index = phases.indexOf(phase);
    const raised = raisedFrom > 0 && index >= raisedFrom ? frame.roomUnderToday : 0;
    return height - frame.footroom - index * pitch - raised;
  };
  return { pitch, yOf };
}

export function usualDays(phase: TrellisPhase): number {
  return phase.usualEndDay === null ? openEndedDays : Math.max(phase.usualEndDay - phase.usualStartDay, 1);
}

/** The opened phases from the ground up, each with the days it lasted and the days its wire stands for. */
export function grownPhases({ phases, today, review }: TrellisData): GrownPhase[] {
  const opened = phases.flatMap((phase) =>
    phase.openedOnDay === null || phase.openedOnDay > today ? [] : [{ phase, day: phase.openedOnDay }],
  );
  return opened.map(({ phase, day }, index) => {
    const closed = opened[index + 1]?.day ?? null;
    const usual = usualDays(phase);
    const lasted = (closed ?? today + 1) - day;
    // A phase that was opened early, or is past its usual end, waits for its review: the wire must reach it.
    const end = closed === null ? phase.usualEndDay : null;
    const waits = review !== null && end !== null && (lasted > usual || review.day <= end);
    const reviewed = waits ? review.day - day : 0;
    return { phase, opened: day, closed, spanDays: Math.max(usual, lasted, reviewed) };
  });
}
