/** What can stand on the rule, each told by its shape. */
export type MeltMarkKind = 'reserve' | 'leading' | 'price' | 'linked' | 'limit' | 'floor';
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

/** The band shows itself: its label has no leader, which leaves room for the marks on a narrow rule. */
export type LabelRequest = { key: string; text: string; x: number; hasLeader: boolean };
export type PlacedLabel = LabelRequest & {
  lane: number;
  anchor: 'start' | 'end';
  left: number;
  right: number;
};

const GLYPH_WIDTH = 6.7;
const GAP = 10;
const LANES_MOST = 6;
const SEARCH_STEPS_MOST = 20_000;

/** Whether two labels, or the leader of one and the text of the other, would touch. */
function clash(a: PlacedLabel, b: PlacedLabel): boolean {
  if (a.lane === b.lane) return a.left < b.right + GAP && b.left < a.right + GAP;
  const [upper, lower] = a.lane > b.lane ? [a, b] : [b, a];
  return upper.hasLeader && upper.x > lower.left - 4 && upper.x < lower.right + 6;
}

function candidate(request: LabelRequest, lane: number, anchor: 'start' | 'end'): PlacedLabel {
  const textWidth = request.text.length * GLYPH_WIDTH;
  const left = anchor === 'start' ? request.x : request.x - textWidth;
  return { ...request, lane, anchor, left, right: left + textWidth };
}

/** Every place a label could take, the lowest first; what would leave the drawing is left out. */
function optionsFor(request: LabelRequest, width: number): PlacedLabel[] {
  const options: PlacedLabel[] = [];
  for (let lane = 0; lane < LANES_MOST; lane += 1) {
    options.push(candidate(request, lane, 'start'), candidate(request, lane, 'end'));
  }
  const fitting = options.filter((option) => option.left >= 0 && option.right <= width);
  if (fitting.length > 0) return fitting;
  return request.hasLeader ? options : shifted(request, width);
}

/** A text that points at nothing may move aside until all of it is in the drawing. */
function shifted(request: LabelRequest, width: number): PlacedLabel[] {
  const x = Math.max(0, width - request.text.length * GLYPH_WIDTH - GAP);
  return Array.from({ length: LANES_MOST }, (_, lane) => candidate({ ...request, x }, lane, 'start'));
}

const laneCost = (label: PlacedLabel) => label.lane * label.lane + (label.anchor === 'end' ? 0.1 : 0);

/**
 * Stacks the labels in lanes so that neither text nor leader of one touches another, as low as can be: a search over
 * all places, cut off where it cannot better what was found. Where there is no such way, labels may touch.
 */
export function placeLabels(requests: LabelRequest[], width: number): PlacedLabel[] {
  const choices = requests.map((request) => optionsFor(request, width));
  let best = choices.map((options, index) => options[Math.min(options.length - 1, index * 2)] as PlacedLabel);
  let bestCost = Infinity;
  let stepsLeft = SEARCH_STEPS_MOST;
  const search = (placed: PlacedLabel[], cost: number) => {
    const options = choices[placed.length];
    if (!options) {
      best = placed;
      bestCost = cost;
      return;
    }
    for (const option of options) {
      const next = cost + laneCost(option);
      stepsLeft -= 1;
      if (next >= bestCost || stepsLeft < 0) return;
      if (!placed.some((other) => clash(option, other))) search([...placed, option], next);
    }
  };
  search([], 0);
  return best;
}
