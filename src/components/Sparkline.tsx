import { classNames } from './class-names.ts';

type Props = {
  /** In order, oldest first; null is a gap, drawn as a small ring on the ground line. */
  values: (number | null)[];
  min?: number;
  max?: number;
  /** Drawn as a dashed line behind the values. */
  reference?: number;
  /** The colour of the last point. */
  tone?: 'leaf' | 'clay' | 'ochre';
  /** The whole picture in words. */
  label: string;
};

const width = 120;
const height = 32;
const side = 6;
const top = 5;
const ground = 27;

const lastPointFill = { leaf: 'fill-leaf', clay: 'fill-clay', ochre: 'fill-ochre' };

/** A short series as a line of its own height, with its gaps told apart from its values. */
export function Sparkline({ values, min = 0, max = 10, reference, tone = 'leaf', label }: Props) {
  const step = values.length > 1 ? (width - 2 * side) / (values.length - 1) : 0;
  const xOf = (index: number) => side + index * step;
  const yOf = (value: number) => ground - ((value - min) / (max - min)) * (ground - top);
  const last = values.length - 1;
  const lastValue = values[last];
  return (
    <svg
      role="img"
      aria-label={label}
      viewBox={`0 0 ${width} ${height}`}
      className="h-8 w-30 max-w-full overflow-visible"
    >
      <path d={`M0 ${ground}H${width}`} className="stroke-wire forced-colors:stroke-[GrayText]" />
      {reference === undefined ? null : (
        <path
          d={`M0 ${yOf(reference)}H${width}`}
          strokeDasharray="2 3"
          className="stroke-wire-strong opacity-70"
        />
      )}
      {runsOf(values).map((run) => (
        <polyline
          key={run[0]?.index}
          points={run.map(({ index, value }) => `${xOf(index)},${yOf(value)}`).join(' ')}
          className="fill-none stroke-bark stroke-[1.6] forced-colors:stroke-[CanvasText]"
          strokeLinejoin="round"
          strokeLinecap="round"
        />
      ))}
      {values.map((value, index) =>
        value === null ? (
          <circle
            key={index}
            cx={xOf(index)}
            cy={ground}
            r={2.2}
            className="fill-paper stroke-wire-strong stroke-[1.2]"
          />
        ) : null,
      )}
      {lastValue === null || lastValue === undefined ? null : (
        <circle
          cx={xOf(last)}
          cy={yOf(lastValue)}
          r={3.6}
          className={classNames(lastPointFill[tone], 'forced-colors:fill-[Highlight]')}
        />
      )}
    </svg>
  );
}

type Point = { index: number; value: number };

/** The stretches between gaps; a value alone between two gaps is a stretch of one and shows as a dot. */
function runsOf(values: (number | null)[]): Point[][] {
  const runs: Point[][] = [];
  let run: Point[] = [];
  values.forEach((value, index) => {
    if (value !== null) {
      run.push({ index, value });
      if (run.length === 1) runs.push(run);
    } else {
      run = [];
    }
  });
  return runs;
}
