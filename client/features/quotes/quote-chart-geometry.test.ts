import { describe, expect, it } from 'vitest';
import { CHART_HEIGHT, quoteChart, type HistoryPoint } from './quote-chart-geometry.ts';

const point = (day: string, price: string): HistoryPoint => ({ day, price });
const history = [
  point('2026-11-01', '130.10'),
  point('2026-11-02', '131.00'),
  // Two days without a quote.
  point('2026-11-05', '129.20'),
  point('2026-11-06', '133.45'),
];

describe('the drawing of a quote’s history', () => {
  it('draws nothing from fewer than two days', () => {
    expect(quoteChart([], 560)).toBeNull();
    expect(quoteChart(history.slice(0, 1), 560)).toBeNull();
  });

  it('keeps every point inside and leaves room for days without a quote', () => {
    const { points } = quoteChart(history, 560)!;
    for (const { x, y } of points) {
      expect(x).toBeGreaterThanOrEqual(0);
      expect(x).toBeLessThanOrEqual(560);
      expect(y).toBeGreaterThan(0);
      expect(y).toBeLessThan(CHART_HEIGHT);
    }
    const [first, second, third, last] = points.map(({ x }) => x) as [number, number, number, number];
    expect(third - second).toBeCloseTo(3 * (second - first));
    expect(last - third).toBeCloseTo(second - first);
  });

  it('puts the higher price higher', () => {
    const { points } = quoteChart(history, 560)!;
    expect(points[3]!.y).toBeLessThan(points[2]!.y);
  });

  it('rules at least two round prices between the ends, and names the newest day', () => {
    const { prices, days } = quoteChart(history, 560)!;
    expect(prices.map(({ text }) => text)).toEqual(['130', '132']);
    expect(days.at(-1)!.day).toBe('2026-11-06');
  });

  it('draws a level line for a price that never moved', () => {
    const { points, path } = quoteChart([point('2026-11-01', '50'), point('2026-11-02', '50')], 300)!;
    expect(points[0]!.y).toBe(points[1]!.y);
    expect(path).not.toMatch(/NaN|Infinity/);
  });
});
