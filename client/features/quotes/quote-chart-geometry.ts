/** Places on the drawing of a quote's history. Only pixels follow from these numbers; every figure read stays text. */
export type HistoryPoint = { day: string; price: string };
export type PlacedPoint = HistoryPoint & { x: number; y: number };
export type PriceTick = { text: string; y: number };
export type DayTick = { day: string; x: number };
export type QuoteChart = { points: PlacedPoint[]; path: string; prices: PriceTick[]; days: DayTick[] };

export const CHART_HEIGHT = 150;
const PAD = { top: 10, right: 8, bottom: 24, left: 64 };
const DAY_MS = 86_400_000;
const STEPS = [1, 2, 5, 10];

/** The largest step that still gives at least two ruled lines. */
function stepFor(span: number): number {
  const rough = span / 3;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = STEPS.find((factor) => factor * power >= rough) ?? 10;
  return step * power;
}

function tickText(value: number, step: number): string {
  const places = Math.max(0, -Math.floor(Math.log10(step)));
  const [whole = '0', fraction] = value.toFixed(places).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return fraction ? `${grouped}.${fraction}` : grouped;
}

function priceTicks(low: number, high: number, y: (price: number) => number): PriceTick[] {
  const step = stepFor(high - low);
  const ticks: PriceTick[] = [];
  for (let index = Math.ceil(low / step); index * step <= high; index += 1) {
    const value = index * step;
    ticks.push({ text: tickText(value, step), y: y(value) });
  }
  return ticks;
}

/** About four days along the bottom, the newest always among them. */
function dayTicks(points: PlacedPoint[], width: number): DayTick[] {
  const count = Math.max(2, Math.min(5, Math.floor(width / 130)));
  const every = Math.max(1, Math.ceil(points.length / count));
  return points
    .filter((_, index) => (points.length - 1 - index) % every === 0)
    .map(({ day, x }) => ({ day, x }));
}

/** The line of a history in `width` pixels; days without a quote leave their room, so that the line is not squeezed. */
export function quoteChart(history: HistoryPoint[], width: number): QuoteChart | null {
  const first = history[0];
  if (!first || history.length < 2) return null;
  const dayOf = (day: string) => Date.parse(`${day}T00:00:00Z`) / DAY_MS;
  const start = dayOf(first.day);
  const days = history.map(({ day }) => dayOf(day) - start);
  const values = history.map(({ price }) => Number(price));
  const lowest = Math.min(...values);
  const highest = Math.max(...values);
  const margin = Math.max((highest - lowest) * 0.08, highest * 0.002);
  const [low, high] = [lowest - margin, highest + margin];
  const span = Math.max(1, days.at(-1) ?? 1);
  const x = (offset: number) => PAD.left + (offset / span) * (width - PAD.left - PAD.right);
  const y = (price: number) =>
    PAD.top + ((high - price) / (high - low)) * (CHART_HEIGHT - PAD.top - PAD.bottom);
  const points = history.map((point, index) => ({
    ...point,
    x: x(days[index] ?? 0),
    y: y(values[index] ?? 0),
  }));
  const path = points
    .map((point, index) => `${index === 0 ? 'M' : 'L'}${point.x.toFixed(1)} ${point.y.toFixed(1)}`)
    .join('');
  return { points, path, prices: priceTicks(low, high, y), days: dayTicks(points, width) };
}
