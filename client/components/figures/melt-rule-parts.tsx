import { formatPercent } from '../../lib/format.ts';
import {
  LANE_HEIGHT,
  MARGIN,
  place,
  sizes,
  type MeltBand,
  type PlacedLabel,
  type RuleScale,
  type RuleSize,
  type Tick,
} from './melt-rule-geometry.ts';

type BandProps = { band: MeltBand; scale: RuleScale; lineY: number; isLarge: boolean };

export function RuleBand({ band, scale, lineY, isLarge }: BandProps) {
  const left = scale.x(place(band.low));
  const right = Math.max(scale.x(place(band.high)), left + 1.5);
  const [above, below] = isLarge ? [20, 12] : [12, 7];
  const edge = { y1: lineY - above, y2: lineY + below, className: 'stroke-line', strokeWidth: 1 };
  return (
    <g>
      <rect x={left} y={lineY - above} width={right - left} height={above + below} className="fill-band" />
      <line x1={left} x2={left} {...edge} />
      <line x1={right} x2={right} {...edge} />
    </g>
  );
}

type RulerProps = {
  ticks: Tick[];
  scale: RuleScale;
  width: number;
  lineY: number;
  size: RuleSize;
  isEmpty: boolean;
};

/** The line with its ticks and figures, and the mark of melt at 100 %. */
export function Ruler({ ticks, scale, width, lineY, size, isEmpty }: RulerProps) {
  const [minor, major, melt] = sizes[size].tick;
  const meltX = scale.x(100);
  const isLarge = size === 'page';
  return (
    <g className="font-mono text-[11px]" textAnchor="middle">
      <line
        x1={MARGIN}
        x2={width - MARGIN}
        y1={lineY}
        y2={lineY}
        className="stroke-line"
        strokeDasharray={isEmpty ? '3 3' : undefined}
      />
      {ticks.map(({ percent, isMajor }) => (
        <g key={percent}>
          <line
            x1={scale.x(percent)}
            x2={scale.x(percent)}
            y1={lineY}
            y2={lineY + (isMajor ? major : minor)}
            className="stroke-line"
          />
          {isLarge && isMajor && isFreeOf(meltX, scale.x(percent), width) && (
            <text x={scale.x(percent)} y={lineY + 27} className="fill-ink-2">
              {formatPercent(percent.toString())}
            </text>
          )}
        </g>
      ))}
      <line
        x1={meltX}
        x2={meltX}
        y1={lineY - (isLarge ? 4 : 2)}
        y2={lineY + melt}
        className="stroke-ink"
        strokeWidth="2"
      />
      <text x={meltX} y={lineY + (isLarge ? 29 : 19)} className="fill-ink">
        {isLarge ? 'melt 100' : 'melt'}
      </text>
    </g>
  );
}

/** A tick keeps its figure only where that neither runs into the mark of melt nor over the edge. */
function isFreeOf(meltX: number, x: number, width: number): boolean {
  return Math.abs(x - meltX) > 48 && x > 18 && x < width - 18;
}

/** A label with its leader down to what it names. */
export function RuleLabel({ label, lineY }: { label: PlacedLabel; lineY: number }) {
  const baseline = lineY - 28 - label.lane * LANE_HEIGHT;
  return (
    <g>
      {label.hasLeader && (
        <line
          x1={label.x}
          x2={label.x}
          y1={baseline - 9}
          y2={lineY - 15}
          className="stroke-line"
          strokeWidth="0.8"
        />
      )}
      <text
        x={label.x + (label.anchor === 'start' ? 4 : -4)}
        y={baseline}
        textAnchor={label.anchor}
        className={label.hasLeader ? 'fill-ink text-[12px] font-medium' : 'fill-ink-2 text-[12px]'}
      >
        {label.text}
      </text>
    </g>
  );
}
