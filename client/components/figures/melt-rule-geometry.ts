/** What can stand on the rule, each told by its shape. */
export type MeltMarkKind = 'reserve' | 'leading' | 'price' | 'limit' | 'floor';
export type MeltMark = { kind: MeltMarkKind; percent: string };
export type MeltBand = { low: string; high: string };
export type RuleWindow = { low: number; high: number };

const WINDOW_LEAST = 0;
const WINDOW_MOST = 200;
export const MARGIN = 10;

/** `row` stands in a register, `page` on the page of one lot. */
export type RuleSize = 'row' | 'page';

/** Heights in pixels, and the stretch of rule that is shown at least. */
export const sizes = {
  row: { window: { low: 90, high: 104 }, before: 220, line: 24, below: 20, tick: [4, 6, 9] },
  page: { window: { low: 92, high: 104 }, before: 520, line: 44, below: 36, tick: [6, 10, 15] },
} as const;
export const LANE_HEIGHT = 18;

/** A percentage as a place on the drawing. Only pixels follow from it; every figure that is read stays the string. */
export function place(percent: string): number {
  return Number(percent);
}

const within = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));

/** The stretch of rule that shows melt, band and marks; `base` is shown at least, 0 to 200 % at most. */
export function fitWindow(base: RuleWindow, band: MeltBand | null, marks: MeltMark[]): RuleWindow {
  const places = marks.map((mark) => place(mark.percent));
  if (band) places.push(place(band.low), place(band.high));
  const low = within(Math.min(...places, 100), WINDOW_LEAST, 100);
  const high = within(Math.max(...places, 100), 100, WINDOW_MOST);
  const pad = Math.max(1, (high - low) * 0.06);
  return {
    low: low < base.low + 0.5 ? Math.max(WINDOW_LEAST, Math.floor(low - pad)) : base.low,
    high: high > base.high - 0.5 ? Math.min(WINDOW_MOST, Math.ceil(high + pad)) : base.high,
  };
}

export type RuleScale = { x: (percent: number) => number; isInside: (percent: number) => boolean };

/** From percent to pixels; what lies outside the window is held at its edge. */
export function ruleScale(window: RuleWindow, width: number): RuleScale {
  const span = window.high - window.low;
  const isInside = (percent: number) => percent >= window.low && percent <= window.high;
  const x = (percent: number) =>
    MARGIN + ((within(percent, window.low, window.high) - window.low) / span) * (width - 2 * MARGIN);
  return { x, isInside };
}

export type Tick = { percent: number; isMajor: boolean };

const steps: [minor: number, major: number][] = [
  [1, 5],
  [2, 10],
  [5, 25],
  [10, 50],
  [20, 100],
];

/** Ticks at whole percents, never closer than 7 px, numbered ones never closer than 40 px. */
export function ruleTicks(window: RuleWindow, width: number): Tick[] {
  const perPercent = (width - 2 * MARGIN) / (window.high - window.low);
  const [minor, major] = steps.find(
    ([least, most]) => least * perPercent >= 7 && most * perPercent >= 40,
  ) ?? [20, 100];
  const ticks: Tick[] = [];
  for (let percent = Math.ceil(window.low / minor) * minor; percent <= window.high; percent += minor) {
    ticks.push({ percent, isMajor: percent % major === 0 });
  }
  return ticks;
}

export type LabelRequest = { key: string; text: string; x: number };
export type PlacedLabel = LabelRequest & {
  lane: number;
  anchor: 'start' | 'end';
  left: number;
  right: number;
};

const GLYPH_WIDTH = 6.7;
const GAP = 10;
const LANES_MOST = 6;

/** Whether two labels, or the leader of one and the text of the other, would touch. */
function clash(a: PlacedLabel, b: PlacedLabel): boolean {
  if (a.lane === b.lane) return a.left < b.right + GAP && b.left < a.right + GAP;
  const [upper, lower] = a.lane > b.lane ? [a, b] : [b, a];
  return upper.x > lower.left - 3 && upper.x < lower.right + 3;
}

function candidate(request: LabelRequest, lane: number, anchor: 'start' | 'end'): PlacedLabel {
  const textWidth = request.text.length * GLYPH_WIDTH;
  const left = anchor === 'start' ? request.x : request.x - textWidth;
  return { ...request, lane, anchor, left, right: left + textWidth };
}

/** Gives every label the lowest lane in which neither its text nor its leader touches another. */
export function placeLabels(requests: LabelRequest[], width: number): PlacedLabel[] {
  const placed: PlacedLabel[] = [];
  for (const request of [...requests].sort((a, b) => b.x - a.x)) {
    const options: PlacedLabel[] = [];
    for (let lane = 0; lane < LANES_MOST; lane += 1) {
      options.push(candidate(request, lane, 'start'), candidate(request, lane, 'end'));
    }
    const fitting = options.filter((option) => option.left >= 0 && option.right <= width);
    const free = fitting.find((option) => !placed.some((other) => clash(option, other)));
    placed.push(
      free ?? fitting.at(-1) ?? candidate(request, LANES_MOST - 1, request.x > width / 2 ? 'end' : 'start'),
    );
  }
  return placed;
}
