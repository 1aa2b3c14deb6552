import type { MeltMarkKind } from './melt-rule-geometry.ts';

type MeltMarkShapeProps = { kind: MeltMarkKind; x: number; y: number };

/** The shapes that stand on the line of the rule at `y`; shape tells them apart, colour only helps. */
export function MeltMarkShape({ kind, x, y }: MeltMarkShapeProps) {
  switch (kind) {
    case 'price':
      return <path d={`M${x - 6} ${y - 13}h12L${x} ${y - 2}z`} className="fill-verdigris" />;
    case 'linked':
      return (
        <path
          d={`M${x - 6} ${y - 13}h12L${x} ${y - 2}z M${x - 6} ${y - 17}h12`}
          className="fill-sheet stroke-verdigris"
          strokeWidth="1.6"
        />
      );
    case 'leading':
      return <path d={`M${x} ${y - 14}l5.5 5.5-5.5 5.5-5.5-5.5z`} className="fill-ink" />;
    case 'reserve':
      return (
        <rect
          x={x - 4.5}
          y={y - 12}
          width="9"
          height="9"
          className="fill-sheet stroke-ink"
          strokeWidth="1.4"
        />
      );
    case 'limit':
      return (
        <path
          d={`M${x} ${y}v-21h11l-3.5 4 3.5 4h-11`}
          fill="none"
          className="stroke-lapis"
          strokeWidth="1.6"
        />
      );
    case 'floor':
      return <path d={`M${x - 6} ${y - 11}v8h12v-8`} fill="none" className="stroke-ink" strokeWidth="1.6" />;
  }
}

/** The same shape beside a word, as its key. */
export function MeltMarkKey({ kind }: { kind: MeltMarkKind }) {
  return (
    <svg viewBox="-8 -24 22 26" className="inline-block h-4 w-3.5 align-[-3px]" aria-hidden="true">
      <MeltMarkShape kind={kind} x={0} y={0} />
    </svg>
  );
}
