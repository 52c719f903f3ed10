import type { TrellisGeometry, TrellisLeaf } from '#src/features/plans/trellis-geometry.ts';

type Point = { x: number; y: number };

/** A convex outline around everything that the leaf's path draws. */
function leafOutline(leaf: TrellisLeaf): Point[] {
  const { length: l, halfWidth: w } = leaf;
  const upper: [number, number][] = leaf.flagged
    ? [
        [0, 0],
        [0.55 * l, -w],
        [0.9 * l, -w],
        [l, -0.5 * w],
      ]
    : [
        [0, 0],
        [0.3 * l, -w],
        [0.7 * l, -w],
        [l, 0],
      ];
  const lower = upper.map(([along, across]): [number, number] => [along, -across]).reverse();
  const turn = (leaf.angle * Math.PI) / 180;
  return [...upper, ...lower].map(([along, across]) => ({
    x: leaf.x + along * Math.cos(turn) - across * Math.sin(turn),
    y: leaf.y + along * Math.sin(turn) + across * Math.cos(turn),
  }));
}

function circleOutline({ x, y, radius }: { x: number; y: number; radius: number }): Point[] {
  return Array.from({ length: 24 }, (_, corner) => {
    const turn = (corner / 24) * 2 * Math.PI;
    return { x: x + radius * Math.cos(turn), y: y + radius * Math.sin(turn) };
  });
}

/** Whether two convex outlines share ground; outlines that only touch do not (separating axis theorem). */
function overlap(first: Point[], second: Point[]): boolean {
  return ![...normalsOf(first), ...normalsOf(second)].some((axis) => {
    const [firstLow, firstHigh] = shadowOf(first, axis);
    const [secondLow, secondHigh] = shadowOf(second, axis);
    return firstHigh <= secondLow + 1e-6 || secondHigh <= firstLow + 1e-6;
  });
}

function normalsOf(outline: Point[]): Point[] {
  const normals = outline.map((from, index) => {
    const to = outline[(index + 1) % outline.length]!;
    return { x: from.y - to.y, y: to.x - from.x };
  });
  // Two equal corners give no direction, and every shadow on none is the same point.
  return normals.filter(({ x, y }) => Math.hypot(x, y) > 1e-9);
}

function shadowOf(outline: Point[], axis: Point): [number, number] {
  const along = outline.map(({ x, y }) => x * axis.x + y * axis.y);
  return [Math.min(...along), Math.max(...along)];
}

type Named = { name: string; outline: Point[]; left: number; right: number };

const named = (name: string, outline: Point[]): Named => {
  const [left, right] = shadowOf(outline, { x: 1, y: 0 });
  return { name, outline, left, right };
};

/** Everything that stands for a day, with a name to tell it by when something is wrong. */
export function outlinesOf(geometry: TrellisGeometry): Named[] {
  return [
    ...geometry.leaves.map((leaf, index) => named(`leaf ${index}`, leafOutline(leaf))),
    ...geometry.bareNodes.map((node, index) => named(`bare node ${index}`, circleOutline(node))),
    named('ring of today', circleOutline(geometry.today)),
  ];
}

/** The names of the pairs that share ground. */
export function clashesOf(outlines: Named[]): string[] {
  // Most pairs are far apart along the wire, and a glance at that spares the full comparison.
  const sorted = [...outlines].sort((first, second) => first.left - second.left);
  return sorted.flatMap((first, index) => {
    const end = sorted.findIndex((second, at) => at > index && second.left > first.right);
    const near = sorted.slice(index + 1, end === -1 ? undefined : end);
    return near
      .filter((second) => overlap(first.outline, second.outline))
      .map((second) => `${first.name} with ${second.name}`);
  });
}
