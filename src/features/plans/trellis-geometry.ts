import type { TrellisData, TrellisPhase } from '#shared/plans/trellis.ts';
import { fanWidth, leafShape, trellisFrames } from './trellis-frame.ts';
import type { TrellisFrame, TrellisSize } from './trellis-frame.ts';
import { grownPhases, hangWires, usualDays } from './trellis-phases.ts';
import type { GrownPhase } from './trellis-phases.ts';
import { dailyMarks, weeklyMarks } from './trellis-marks.ts';

/** Where each part of the trellis stands, in the units of its own box. Angles are degrees, clockwise. */
export type TrellisGeometry = {
  width: number;
  height: number;
  wires: TrellisWire[];
  /** From the ground up to the highest wire that a phase was opened on; null while none is. */
  trunk: { x: number; groundY: number; topY: number } | null;
  branches: TrellisBranch[];
  leaves: TrellisLeaf[];
  /** Days without a check-in. */
  bareNodes: { x: number; y: number; radius: number }[];
  today: { x: number; y: number; radius: number };
  review: { x: number; y: number; halfHeight: number } | null;
};

type TrellisWire = { code: string; name: string; y: number; knots: number[]; current: boolean };

export type TrellisBranch = {
  code: string;
  /** Where it leaves the trunk: it bends from the upright into the wire over this length. */
  rootX: number;
  bend: number;
  y: number;
  endX: number;
  /** Where its end turns up, because the next phase was opened; null while it still grows. */
  tip: { x: number; y: number } | null;
};

export type TrellisLeaf = {
  /** The foot of the leaf. */
  x: number;
  y: number;
  angle: number;
  length: number;
  halfWidth: number;
  flagged: boolean;
};

/** Days closer together than this cannot be told apart: such a wire has a leaf a week, also in the large. */
const leastDayX = 1.8;

/**
 * Lays the trellis out. Each wire is as long as its phase usually lasts; a phase that runs longer is drawn
 * denser, so that the branch never leaves its wire. A phase counts from the day a clinician opened it, and
 * never from its usual day. For a right shoulder everything is reflected.
 */
export function layOutTrellis(data: TrellisData, size: TrellisSize): TrellisGeometry {
  const frame = trellisFrames[size];
  const height = frame.height(data.phases.length);
  const xOf = (dayInPhase: number, spanDays: number) =>
    frame.firstX + (dayInPhase / spanDays) * (frame.lastX - frame.firstX);

  const grown = grownPhases(data);
  const current = grown.at(-1);
  const highest = current?.phase ?? data.phases[0];
  const { pitch, yOf } = hangWires(data.phases, highest, frame, height);
  const parts = grown.map((phase) => growAlong(phase, data, frame, pitch, yOf(phase.phase), xOf));
  const today = {
    x: parts.at(-1)?.tipX ?? frame.firstX + frame.todayRadius,
    y: highest ? yOf(highest) : height / 2,
    radius: frame.todayRadius,
  };
  const leaves = parts.flatMap((part) => part.leaves);
  if (size === 'large') leaves.push(...leafOfToday(data, frame, today));

  const geometry: TrellisGeometry = {
    width: frame.width,
    height,
    wires: data.phases.map((phase) => ({
      code: phase.code,
      name: phase.name,
      y: yOf(phase),
      knots: [frame.trunkX, (frame.trunkX + frame.lastX) / 2, frame.lastX],
      current: phase === highest,
    })),
    trunk: current ? { x: frame.trunkX, groundY: height, topY: yOf(current.phase) } : null,
    branches: parts.map((part) => part.branch),
    leaves,
    bareNodes: parts.flatMap((part) => part.bareNodes),
    today,
    review: size === 'large' ? placeReview(data, current, frame, today.x, yOf, xOf) : null,
  };
  return data.arm === 'right' ? reflect(geometry) : geometry;
}

type Grown = {
  branch: TrellisBranch;
  leaves: TrellisLeaf[];
  bareNodes: TrellisGeometry['bareNodes'];
  /** Where the branch ends: today's place on the wire that still grows. */
  tipX: number;
};

function growAlong(
  { phase, opened, closed, spanDays }: GrownPhase,
  { days, today }: TrellisData,
  frame: TrellisFrame,
  pitch: number,
  y: number,
  xOf: (dayInPhase: number, spanDays: number) => number,
): Grown {
  const end = closed ?? today;
  const own = days.filter(({ day }) => day >= opened && day < end);
  const dayX = xOf(1, spanDays) - xOf(0, spanDays);
  const daysPerLeaf = dayX < leastDayX ? 7 : frame.daysPerLeaf;
  const marks = daysPerLeaf === 1 ? dailyMarks(own, opened) : weeklyMarks(own, opened, end, closed !== null);
  const stepX = dayX * daysPerLeaf;
  const shape = leafShape(frame, stepX, pitch);
  const radians = (frame.leaf.angle * Math.PI) / 180;

  const leaves: TrellisLeaf[] = [];
  const bareNodes: Grown['bareNodes'] = [];
  for (const { at, place, kind } of marks) {
    const x = xOf(at, spanDays);
    if (kind === 'missed') {
      bareNodes.push({ x, y, radius: Math.min(frame.nodeRadius, stepX * 0.42) });
    } else {
      const up = place % 2 === 1 && frame.bothSides ? 1 : -1;
      const flagged = kind === 'flagged';
      leaves.push({
        x,
        y: y + up * frame.leaf.foot,
        angle: up * frame.leaf.angle,
        length: shape.length,
        halfWidth: flagged ? shape.halfWidth * fanWidth : shape.halfWidth,
        flagged,
      });
    }
  }

  // The ring of today keeps clear of the last leaf, which leans towards it.
  const lastMark = marks.at(-1);
  const clearance =
    (frame.todayRadius + 1 + shape.halfWidth * fanWidth - frame.leaf.foot * Math.cos(radians)) /
    Math.sin(radians);
  const endX = xOf(end - opened, spanDays);
  const clearX = lastMark ? xOf(lastMark.at, spanDays) + clearance : frame.firstX + frame.todayRadius;
  const tipX = closed === null ? Math.max(endX, clearX) : endX;
  return {
    branch: {
      code: phase.code,
      rootX: frame.trunkX,
      bend: frame.bend,
      y,
      endX: tipX,
      tip: closed === null ? null : { x: tipX + frame.tip.along, y: y - frame.tip.up },
    },
    leaves,
    bareNodes,
    tipX,
  };
}

/** Once today has its check-in, a leaf grows out of the ring. */
function leafOfToday(data: TrellisData, frame: TrellisFrame, ring: TrellisGeometry['today']): TrellisLeaf[] {
  const entry = data.days.find(({ day }) => day === data.today);
  if (!entry || entry.kind === 'missed') return [];
  const flagged = entry.kind === 'flagged';
  const halfWidth = frame.leaf.halfWidth * (flagged ? fanWidth : 1);
  const y = ring.y - ring.radius - 1;
  return [{ x: ring.x, y, angle: -60, length: frame.leaf.length, halfWidth, flagged }];
}

/** A review stands on the wire that still grows, or on the wire of the phase in whose usual time it falls. */
function placeReview(
  { review, phases, today }: TrellisData,
  current: GrownPhase | undefined,
  frame: TrellisFrame,
  todayX: number,
  yOf: (phase: TrellisPhase) => number,
  xOf: (dayInPhase: number, spanDays: number) => number,
): TrellisGeometry['review'] {
  if (!review || review.day < today) return null;
  const mark = (phase: TrellisPhase, dayInPhase: number, spanDays: number) => ({
    x: xOf(dayInPhase, spanDays),
    y: yOf(phase),
    halfHeight: frame.reviewHalfHeight,
  });
  const isLast = current?.phase === phases.at(-1);
  if (current && (isLast || review.day - current.opened <= current.spanDays)) {
    // The last phase has no usual end: a review beyond its wire stands at the end of it.
    const dayInPhase = Math.min(review.day - current.opened, current.spanDays);
    const place = mark(current.phase, dayInPhase, current.spanDays);
    // The ring of today may stand a little ahead of its day; a review never stands behind it.
    return { ...place, x: Math.max(place.x, todayX) };
  }
  const later = phases.slice(current ? phases.indexOf(current.phase) + 1 : 0);
  const ahead = later.find((phase) => phase.usualEndDay === null || review.day <= phase.usualEndDay);
  if (!ahead) return null;
  const span = usualDays(ahead);
  return mark(ahead, Math.min(Math.max(review.day - ahead.usualStartDay, 0), span), span);
}

function reflect(geometry: TrellisGeometry): TrellisGeometry {
  const flip = (x: number) => geometry.width - x;
  const flipped = <Part extends { x: number }>(part: Part): Part => ({ ...part, x: flip(part.x) });
  return {
    ...geometry,
    wires: geometry.wires.map((wire) => ({ ...wire, knots: wire.knots.map(flip) })),
    trunk: geometry.trunk && flipped(geometry.trunk),
    branches: geometry.branches.map((branch) => ({
      ...branch,
      rootX: flip(branch.rootX),
      bend: -branch.bend,
      endX: flip(branch.endX),
      tip: branch.tip && flipped(branch.tip),
    })),
    leaves: geometry.leaves.map((leaf) => ({ ...flipped(leaf), angle: 180 - leaf.angle })),
    bareNodes: geometry.bareNodes.map(flipped),
    today: flipped(geometry.today),
    review: geometry.review && flipped(geometry.review),
  };
}
