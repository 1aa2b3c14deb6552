export const INK = '#1C2427';
export const PAPER = '#FFFDF8';

/** A number between −span and span that is always the same for the same seed and index. */
export function wobble(seed: number, index: number, span: number): number {
  return ((Math.sin(seed * 12.9898 + index * 78.233) * 43758.5453) % 1) * span;
}

type Point = readonly [x: number, y: number];
type Round = { x: number; y: number; rx: number; ry: number; rough: number; seed: number; points?: number };

/** A closed line through the points, without corners. */
export function smooth(points: readonly Point[]): string {
  const at = (index: number) => points[(index + points.length) % points.length] as Point;
  const curves = points.map((_, index) => {
    const [before, from, to, after] = [at(index - 1), at(index), at(index + 1), at(index + 2)];
    const first = [from[0] + (to[0] - before[0]) / 6, from[1] + (to[1] - before[1]) / 6];
    const second = [to[0] - (after[0] - from[0]) / 6, to[1] - (after[1] - from[1]) / 6];
    return `C${[...first, ...second, ...to].join(' ')}`;
  });
  return `M${at(0).join(' ')}${curves.join('')}Z`;
}

/** An outline as round as cast metal is: never quite. */
export function blob({ x, y, rx, ry, rough, seed, points = 14 }: Round): string {
  return smooth(
    Array.from({ length: points }, (_, index) => {
      const angle = (index / points) * 2 * Math.PI;
      const reach = 1 + wobble(seed, index + 40, rough);
      return [x + rx * reach * Math.cos(angle), y + ry * reach * Math.sin(angle)] as const;
    }),
  );
}

type Look = { width?: number; fill?: string };

/** A line of the drawing; without a fill it covers nothing. */
export function line(d: string, { width = 5, fill = 'none' }: Look = {}): string {
  return `<path d="${d}" fill="${fill}" stroke="${INK}" stroke-width="${width}" stroke-linejoin="round" stroke-linecap="round"/>`;
}

/** Hatching alone, without an outline. */
export function shade(d: string, hatch: 'wide' | 'close' | 'crossed'): string {
  return `<path d="${d}" fill="url(#${hatch})" fill-rule="evenodd"/>`;
}

/** Shows of `content` what lies within the outline. */
export function within(id: string, d: string, content: string): string {
  return `<clipPath id="${id}"><path d="${d}"/></clipPath><g clip-path="url(#${id})">${content}</g>`;
}

/** A hole of the laboratory's drill: its wall in the shade. */
export function drillHole(x: number, y: number, radius: number): string {
  const circle = `M${x - radius} ${y}a${radius} ${radius} 0 1 0 ${radius * 2} 0a${radius} ${radius} 0 1 0 ${-radius * 2} 0Z`;
  return line(circle, { fill: PAPER, width: 4 }) + shade(circle, 'crossed');
}

const slant = (id: string, step: number, more = '') =>
  `<pattern id="${id}" width="${step}" height="${step}" patternUnits="userSpaceOnUse" patternTransform="rotate(38)">
  <path d="M0 0V${step}${more}" stroke="${INK}" stroke-width="1.8" opacity="0.6"/></pattern>`;

/** The three densities of hatching that a drawing is shaded with. */
export const HATCHES = slant('wide', 15) + slant('close', 8) + slant('crossed', 9, 'M0 0H9');
