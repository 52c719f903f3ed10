import { classNames } from '#src/components/class-names.ts';
import type { TrellisData } from '#shared/plans/trellis.ts';
import { layOutTrellis } from './trellis-geometry.ts';
import type { TrellisSize } from './trellis-frame.ts';
import type { TrellisBranch, TrellisGeometry, TrellisLeaf } from './trellis-geometry.ts';

type Props = {
  data: TrellisData;
  /** Large stands on a page of its own with the names of the phases; small fits a row of a table. */
  size: TrellisSize;
  /** The whole picture in words. */
  label: string;
  /** The next review in words; large only. */
  reviewLabel?: string;
};

/** The picture of a recovery: a wire a phase, a leaf a check-in. */
export function Trellis({ data, size, label, reviewLabel }: Props) {
  const geometry = layOutTrellis(data, size);
  const drawing = <Drawing geometry={geometry} size={size} />;
  if (size === 'small') {
    return (
      <span role="img" aria-label={label} className="inline-block h-[2.375rem] w-31 align-middle">
        {drawing}
      </span>
    );
  }
  const mirrored = data.arm === 'right';
  return (
    <figure role="img" aria-label={label} className="max-w-120">
      <div aria-hidden className={classNames('flex gap-2.5', mirrored && 'flex-row-reverse')}>
        {/* The rows share the height of the drawing between them, so that each name stands at its wire. */}
        <div
          className={classNames(
            'flex max-w-[40%] flex-col-reverse text-sm leading-[1.05]',
            mirrored ? 'text-left' : 'text-right',
          )}
        >
          {geometry.wires.map((wire) => (
            <div
              key={wire.code}
              className={classNames(
                'flex min-h-0 flex-1 items-center',
                !mirrored && 'justify-end',
                wire.current ? 'font-black text-ink' : 'text-ink-soft',
              )}
            >
              {wire.name}
            </div>
          ))}
        </div>
        <div className="min-w-0 grow">{drawing}</div>
      </div>
      {reviewLabel && geometry.review ? (
        <p
          aria-hidden
          className={classNames(
            'flex items-center gap-2 text-sm leading-snug text-ink-soft',
            mirrored ? 'justify-start' : 'justify-end',
          )}
        >
          <svg viewBox="0 0 4 18" className="h-[1.1em] w-1 shrink-0">
            <path d="M2 1V17" className={reviewLine} strokeDasharray="2 3" />
          </svg>
          {reviewLabel}
        </p>
      ) : null}
    </figure>
  );
}

const reviewLine = 'stroke-ink-soft stroke-[1.6] forced-colors:stroke-[CanvasText]';
const bark = 'fill-none stroke-bark forced-colors:stroke-[CanvasText]';

function Drawing({ geometry, size }: { geometry: TrellisGeometry; size: TrellisSize }) {
  const { width, height, wires, trunk, branches, leaves, bareNodes, today, review } = geometry;
  const large = size === 'large';
  const branchWidth = large ? 'stroke-[3.6]' : 'stroke-[1.8]';
  return (
    <svg viewBox={`0 0 ${width} ${height}`} aria-hidden className="block w-full" strokeLinecap="round">
      {wires.map((wire) => (
        <g key={wire.code}>
          <path
            d={`M2 ${wire.y}H${width - 2}`}
            className={classNames(
              'stroke-wire forced-colors:stroke-[GrayText]',
              large ? 'stroke-[1.3]' : 'stroke-1',
            )}
          />
          {large
            ? wire.knots.map((x) => (
                <circle key={x} cx={x} cy={wire.y} r={1.9} className="fill-wire-strong" />
              ))
            : null}
        </g>
      ))}
      {review ? (
        <path
          d={`M${review.x} ${review.y - review.halfHeight}V${review.y + review.halfHeight}`}
          strokeDasharray="2 3"
          className={reviewLine}
        />
      ) : null}
      {trunk ? (
        <path
          d={`M${trunk.x} ${trunk.groundY}V${trunk.topY + Math.abs(branches[0]?.bend ?? 0)}`}
          className={classNames(bark, branchWidth)}
          strokeLinecap="butt"
        />
      ) : null}
      {branches.map((branch) => (
        <path key={branch.code} d={branchPath(branch)} className={classNames(bark, branchWidth)} />
      ))}
      {leaves.map((leaf) => (
        <path
          key={`${leaf.x} ${leaf.y}`}
          d={leaf.flagged ? fanPath(leaf) : leafPath(leaf)}
          transform={`translate(${leaf.x} ${leaf.y}) rotate(${leaf.angle})`}
          className={leafClass(leaf, large)}
        />
      ))}
      {bareNodes.map((node) => (
        <circle
          key={`${node.x} ${node.y}`}
          cx={node.x}
          cy={node.y}
          r={node.radius}
          className={classNames(
            'fill-paper stroke-bark forced-colors:fill-[Canvas] forced-colors:stroke-[CanvasText]',
            large ? 'stroke-[1.3]' : 'stroke-[0.9]',
          )}
        />
      ))}
      <circle
        cx={today.x}
        cy={today.y}
        r={today.radius}
        className={classNames(
          'fill-paper stroke-leaf forced-colors:fill-[Canvas] forced-colors:stroke-[Highlight]',
          large ? 'stroke-2' : 'stroke-[1.5]',
        )}
      />
      {large ? (
        <circle
          cx={today.x}
          cy={today.y}
          r={today.radius * 0.42}
          className="fill-leaf forced-colors:fill-[Highlight]"
        />
      ) : null}
    </svg>
  );
}

function branchPath({ rootX, bend, y, endX, tip }: TrellisBranch): string {
  const root = `M${rootX} ${y + Math.abs(bend)}Q${rootX} ${y} ${rootX + bend} ${y}H${endX}`;
  return tip ? `${root}Q${tip.x} ${y} ${tip.x} ${tip.y}` : root;
}

/** A pointed oval along its own axis, foot at the origin. */
function leafPath({ length, halfWidth }: TrellisLeaf): string {
  // The widest part of such a curve lies at three quarters of its handles.
  const handle = (halfWidth * 4) / 3;
  return `M0 0C${length * 0.2} ${-handle} ${length * 0.75} ${-handle} ${length} 0C${length * 0.75} ${handle} ${length * 0.2} ${handle} 0 0Z`;
}

/** A fan with a notch, as of a ginkgo: told from the others by its outline, without colour. */
function fanPath({ length, halfWidth }: TrellisLeaf): string {
  const shoulder = length * 0.62;
  return (
    `M0 0Q${shoulder * 0.5} ${-halfWidth * 0.3} ${shoulder} ${-halfWidth}` +
    `Q${length} ${-halfWidth} ${length} ${-halfWidth * 0.25}L${length * 0.74} 0L${length} ${halfWidth * 0.25}` +
    `Q${length} ${halfWidth} ${shoulder} ${halfWidth}Q${shoulder * 0.5} ${halfWidth * 0.3} 0 0Z`
  );
}

/** The two greens only keep a dense row lively; they mean nothing. */
function leafClass(leaf: TrellisLeaf, large: boolean): string {
  if (leaf.flagged) return 'fill-ochre forced-colors:fill-[Highlight]';
  return classNames(
    'fill-leaf forced-colors:fill-[CanvasText]',
    large && Math.round(leaf.x) % 3 === 0 && 'opacity-75',
  );
}
