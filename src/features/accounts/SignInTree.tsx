import { dressingOf, seasonOf, tiers } from './sign-in-tree.ts';
import type { Dressing, Season, Tier } from './sign-in-tree.ts';

type Props = {
  /** 1 to 12; it decides whether the tree flowers, stands in leaf, bears fruit or rests. */
  month: number;
};

const trunkX = 290;
const groundY = 530;
const trunkTopY = 44;

/** A grown espalier on its wires. It says nothing that is not said elsewhere, so it is hidden from readers. */
export function SignInTree({ month }: Props) {
  const season = seasonOf(month);
  return (
    <svg aria-hidden viewBox="0 0 580 540" className="block h-auto w-full" strokeLinecap="round">
      <path d={`M70 ${groundY}H510`} className="stroke-bark stroke-2 opacity-60" />
      {tiers.map(({ y }) => (
        <g key={y}>
          <path d={`M4 ${y}H576`} className="stroke-wire-strong stroke-1 opacity-45" />
          <circle cx={4} cy={y} r={3} className="fill-wire-strong" />
          <circle cx={576} cy={y} r={3} className="fill-wire-strong" />
        </g>
      ))}
      <path
        d={`M${trunkX - 6} ${groundY}L${trunkX - 3.5} ${trunkTopY}H${trunkX + 3.5}L${trunkX + 6} ${groundY}Z`}
        className="fill-bark stroke-bark stroke-2"
        strokeLinejoin="round"
      />
      {tiers.map((tier) => (
        <g key={tier.y}>
          <Limb tier={tier} side={-1} season={season} />
          <Limb tier={tier} side={1} season={season} />
        </g>
      ))}
      <Crown season={season} />
    </svg>
  );
}

type LimbProps = { tier: Tier; side: -1 | 1; season: Season };

function Limb({ tier, side, season }: LimbProps) {
  const { y, reach, thickness } = tier;
  return (
    <g className="fill-none">
      <path
        d={`M${trunkX} ${y + 46}Q${trunkX} ${y} ${trunkX + side * 58} ${y}H${trunkX + side * reach}`}
        strokeWidth={thickness}
        className="stroke-bark"
      />
      {dressingOf(tier, side, season).map((dressing) => (
        <DressingFigure
          key={`${dressing.kind} ${dressing.along} ${dressing.up}`}
          dressing={dressing}
          side={side}
          y={y}
        />
      ))}
    </g>
  );
}

function DressingFigure({ dressing, side, y }: { dressing: Dressing; side: -1 | 1; y: number }) {
  const x = trunkX + side * dressing.along;
  const up = dressing.up ? -1 : 1;
  switch (dressing.kind) {
    case 'leaf':
      return (
        <ellipse
          rx={11 * dressing.scale}
          ry={5.4 * dressing.scale}
          transform={`translate(${x} ${y + up * 12}) rotate(${side * up * 47})`}
          opacity={dressing.opacity}
          className="fill-leaf"
        />
      );
    case 'blossom':
      return (
        <g transform={`translate(${x} ${y + up * 11})`}>
          {[0, 72, 144, 216, 288].map((turn) => (
            <circle
              key={turn}
              cx={0}
              cy={-4.6}
              r={3.6}
              transform={`rotate(${turn})`}
              className="fill-clay opacity-45"
            />
          ))}
          <circle r={2.2} className="fill-ochre" />
        </g>
      );
    case 'fruit':
      return (
        <g>
          <path d={`M${x} ${y}V${y + 14}`} className="stroke-bark stroke-[1.6]" />
          <circle cx={x} cy={y + 20} r={7.8} className="fill-clay opacity-85" />
        </g>
      );
    case 'bud':
      return (
        <ellipse
          rx={4.4}
          ry={2.5}
          transform={`translate(${x} ${y + up * 6}) rotate(${side * up * 52})`}
          className="fill-bark"
        />
      );
  }
}

/** The growing point at the head of the trunk. */
function Crown({ season }: { season: Season }) {
  if (season === 'winter') return <ellipse cx={trunkX} cy={38} rx={4} ry={7} className="fill-bark" />;
  return (
    <g className="fill-leaf">
      <ellipse cx={trunkX} cy={27} rx={5} ry={11} />
      <ellipse rx={11} ry={5} transform={`translate(${trunkX - 9} 38) rotate(62)`} />
      <ellipse rx={11} ry={5} transform={`translate(${trunkX + 9} 38) rotate(-62)`} />
    </g>
  );
}
