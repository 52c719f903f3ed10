/** The measures of the two sizes of the trellis, in the units of their own boxes. */
export type TrellisSize = 'large' | 'small';

export type TrellisFrame = {
  width: number;
  height: (phases: number) => number;
  /** From the top of the box to the highest wire, and from the lowest wire to the ground. */
  headroom: number;
  footroom: number;
  /** More room under the wire that grows, so that the ring of today does not touch the leaves below it. */
  roomUnderToday: number;
  trunkX: number;
  bend: number;
  /** The stretch of a wire along which days are laid out. */
  firstX: number;
  lastX: number;
  daysPerLeaf: number;
  /** Leaves above and below the wire in turn; where wires are close, all stand above it and can be larger. */
  bothSides: boolean;
  leaf: { foot: number; angle: number; length: number; halfWidth: number };
  nodeRadius: number;
  todayRadius: number;
  tip: { along: number; up: number };
  reviewHalfHeight: number;
};

export const trellisFrames: Record<TrellisSize, TrellisFrame> = {
  large: {
    width: 300,
    height: (phases) => phases * 48,
    headroom: 24,
    footroom: 24,
    roomUnderToday: 0,
    trunkX: 8,
    bend: 10,
    firstX: 20,
    lastX: 280,
    daysPerLeaf: 1,
    bothSides: true,
    leaf: { foot: 2.4, angle: 52, length: 10.5, halfWidth: 2.7 },
    nodeRadius: 2.7,
    todayRadius: 7,
    tip: { along: 4.5, up: 9 },
    reviewHalfHeight: 11,
  },
  small: {
    width: 124,
    height: () => 38,
    headroom: 8.6,
    footroom: 4.4,
    roomUnderToday: 3,
    trunkX: 3,
    bend: 3,
    firstX: 6,
    lastX: 114,
    daysPerLeaf: 7,
    bothSides: false,
    leaf: { foot: 1, angle: 40, length: 7, halfWidth: 1.6 },
    nodeRadius: 1.4,
    todayRadius: 2.8,
    tip: { along: 2, up: 3 },
    reviewHalfHeight: 0,
  },
};

/** Leaves of two neighbouring wires must not meet: each keeps to this share of the room between wires. */
const shareOfPitch = 0.86;

/** The widest that a leaf may be, as a share of the room between two leaves of the same side. */
const shareOfRoom = 0.38;

/** A flagged day's leaf is a fan, wider at its end than the others; two of them side by side still fit. */
export const fanWidth = 1.3;

export type LeafShape = { length: number; halfWidth: number };

/** The size of the leaves of one wire: as large as the frame allows and as the room between them asks. */
export function leafShape({ leaf, bothSides }: TrellisFrame, stepX: number, pitch: number): LeafShape {
  const radians = (leaf.angle * Math.PI) / 180;
  const room = (bothSides ? 2 : 1) * stepX * Math.sin(radians);
  const halfWidth = Math.min(leaf.halfWidth, room * shareOfRoom);
  const tallest =
    ((bothSides ? pitch / 2 : pitch) * shareOfPitch - leaf.foot - halfWidth * fanWidth * Math.cos(radians)) /
    Math.sin(radians);
  return {
    length: Math.min(leaf.length, tallest, (leaf.length / leaf.halfWidth) * halfWidth),
    halfWidth,
  };
}
