import type { ComponentType } from 'react';
import type { LotForm } from './lot-words.tsx';

type ShapeProps = { hatch: string };

const fine = { strokeWidth: 0.6 };
const body = 'var(--sheet)';

function ButtonShape({ hatch }: ShapeProps) {
  return (
    <>
      <path d="M21 61c1-22 17-38 39-38s38 16 39 38c-5 9-21 14-39 14s-34-5-39-14z" fill={body} />
      <path d="M72 25c16 5 26 18 27 36-5 9-21 14-39 14 18-8 26-28 12-50z" fill={hatch} {...fine} />
      <path d="M21 61c6 7 21 11 39 11s33-4 39-11" {...fine} />
      <ellipse cx="54" cy="34" rx="10" ry="4.2" fill={body} {...fine} />
      <path d="M36 41c3 5 10 7 18 7M31 50c4 6 12 9 22 9.5" {...fine} />
    </>
  );
}

function BarShape({ hatch }: ShapeProps) {
  return (
    <>
      <path d="m16 66 8-26 13-11h62l9 25-13 12z" fill={body} />
      <path d="m24 40 13-11h62l-11 11z" {...fine} />
      <path d="m95 66-7-26 11-11 9 25z" fill={hatch} {...fine} />
      <path d="M36 60h40M34 55.5h22" {...fine} />
      <rect x="66" y="46" width="15" height="9" rx="1" {...fine} />
      <path d="M43 34.5c8-2 24-2 36 0" {...fine} />
    </>
  );
}

const grains: [x: number, y: number, r: number][] = [
  [60, 33, 5],
  [50, 38, 5.5],
  [70, 39, 5],
  [60, 43, 5],
  [41, 46, 5],
  [51, 49, 5.5],
  [70, 49.5, 5.5],
  [80, 47, 5],
  [33, 55, 5],
  [43, 57, 5],
  [60, 54, 5],
  [53, 60, 5.5],
  [65, 61, 5],
  [75, 58, 5.5],
  [85, 56, 4.5],
  [25, 64, 5],
  [35, 65, 5.5],
  [45, 67, 5],
  [57, 70, 5.5],
  [69, 70, 5],
  [79, 67, 5],
  [89, 65, 5.5],
  [97, 68, 4.5],
  [17, 71, 4],
];

function GrainShape({ hatch }: ShapeProps) {
  return (
    <>
      {grains.map(([x, y, r], index) => (
        <g key={`${x}-${y}`}>
          <circle cx={x} cy={y} r={r} fill={body} />
          {index % 3 === 0 && <circle cx={x} cy={y} r={r} fill={hatch} />}
          <path
            d={`M${x} ${y + r}a${r} ${r} 0 0 0 ${r}-${r}c-.6 2.5-2.5 4.4-${r} ${r}z`}
            fill={hatch}
            {...fine}
          />
        </g>
      ))}
    </>
  );
}

function KaratScrapShape({ hatch }: ShapeProps) {
  return (
    <>
      <path d="M46 26a22 22 0 1 0 .1 0zm0 6.5a15.5 15.5 0 1 1-.1 0z" fill={hatch} fillRule="evenodd" />
      <path d="M73 50a15 13 0 1 0 .1 0zm0 4.5a10.5 8.5 0 1 1-.1 0z" fill={body} fillRule="evenodd" />
      <path d="M73 54.5a10.5 8.5 0 0 1 8 14l4 2.5a15 13 0 0 0-12-21z" fill={hatch} {...fine} />
      {[0, 1, 2, 3, 4].map((link) => (
        <ellipse
          key={link}
          cx={72 + link * 8}
          cy={32 + (link % 2) * 3 - link}
          rx="5.5"
          ry="3"
          transform={`rotate(${link % 2 ? 18 : -14} ${72 + link * 8} 32)`}
        />
      ))}
      <path d="M15 74c3-8 9-8 10-1 .4 3-3 4-4 1.5" />
    </>
  );
}

function PlatedScrapShape({ hatch }: ShapeProps) {
  return (
    <>
      <path
        d="M20 63C14 54 20 43 31 41c8-1.5 13 2 19 1.5L100 26c4-1.2 7 4 3 6L56 51c-5 3-5 9-12 14-9 6-19 5-24-2z"
        fill={body}
      />
      <path d="M23 61c-4-7 1-14 9-16 7-1.5 12 2 11 8-1.5 8-15 14-20 8z" fill={hatch} {...fine} />
      <path d="m60 46 12-4.5M80 38l14-5.5" {...fine} />
      <path d="M62 72h36l4-14H58zM58 58c6 3.5 38 3.5 44 0-6-3.5-38-3.5-44 0z" fill={body} />
      <path d="M84 60.5c8-.2 14-1 18-2.5l-4 14H85c4-3 3-8-1-11.5z" fill={hatch} {...fine} />
    </>
  );
}

function EScrapShape({ hatch }: ShapeProps) {
  return (
    <>
      <path d="M18 18h84v46H94v10H26V64h-8z" fill={body} />
      <rect x="27" y="26" width="25" height="19" fill={hatch} />
      <rect x="62" y="25" width="13" height="9" {...fine} />
      <rect x="80" y="25" width="13" height="21" {...fine} />
      <path d="M27 51h13v6h20M52 36h10v14h14v-6M86 46v10H70" {...fine} />
      {[0, 1, 2, 3, 4, 5, 6, 7, 8, 9].map((pin) => (
        <rect key={pin} x={29.5 + pin * 6.3} y="64" width="3.6" height="10" fill={hatch} {...fine} />
      ))}
      <circle cx="23" cy="23" r="1.8" {...fine} />
      <circle cx="97" cy="59" r="1.8" {...fine} />
    </>
  );
}

const dust: [x: number, y: number][] = [
  [52, 38],
  [60, 34],
  [67, 39],
  [45, 44],
  [57, 43],
  [64, 46],
  [74, 44],
  [50, 48],
  [79, 49],
  [70, 51],
  [40, 50],
  [60, 51],
  [33, 47],
  [86, 45],
  [29, 51],
];

function SweepsShape({ hatch }: ShapeProps) {
  return (
    <>
      <path d="M32 54c6-13 18-22 28-22s22 9 28 22z" fill={hatch} {...fine} />
      {dust.map(([x, y]) => (
        <circle key={`${x}-${y}`} cx={x} cy={y} r="0.9" fill="currentColor" stroke="none" />
      ))}
      <path d="M14 54h92l-9 21H23z" fill={body} />
      <path d="M14 54c-2 0-2-4 0-4h92c2 0 2 4 0 4" fill={body} />
      <path d="M26 61h68M80 54l-5 21" {...fine} />
      <path d="m88 40 17-22 4 3-16 22z" fill={body} {...fine} />
    </>
  );
}

/** One drawing for each form, on a field of 120 by 90. */
export const specimenShapes: Record<LotForm, ComponentType<ShapeProps>> = {
  button: ButtonShape,
  bar: BarShape,
  grain: GrainShape,
  karat_scrap: KaratScrapShape,
  plated_scrap: PlatedScrapShape,
  e_scrap: EScrapShape,
  sweeps: SweepsShape,
};
