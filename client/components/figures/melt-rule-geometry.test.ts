import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fitWindow,
  placeLabels,
  ruleScale,
  ruleTicks,
  type LabelRequest,
  type PlacedLabel,
} from './melt-rule-geometry.ts';

const base = { low: 92, high: 104 };

function touch(a: PlacedLabel, b: PlacedLabel): boolean {
  if (a.lane === b.lane) return a.left < b.right && b.left < a.right;
  const [upper, lower] = a.lane > b.lane ? [a, b] : [b, a];
  return upper.hasLeader && upper.x > lower.left && upper.x < lower.right;
}

describe('the window of the melt rule', () => {
  it('stays as it is when everything lies inside', () => {
    expect(fitWindow(base, { low: '99.96', high: '100.04' }, [{ kind: 'price', percent: '98.20' }])).toEqual(
      base,
    );
  });

  it('widens to a wide band and always keeps melt in sight', () => {
    const window = fitWindow(base, { low: '62.7', high: '137.3' }, []);
    expect(window.low).toBeLessThan(62.7);
    expect(window.high).toBeGreaterThan(137.3);
  });

  it('ends at 0 and 200 %, and holds what lies beyond at the edge', () => {
    const window = fitWindow(base, null, [
      { kind: 'price', percent: '312.5' },
      { kind: 'reserve', percent: '-4' },
    ]);
    expect(window).toEqual({ low: 0, high: 200 });
    const scale = ruleScale(window, 500);
    expect(scale.isInside(312.5)).toBe(false);
    expect(scale.x(312.5)).toBe(scale.x(200));
  });

  it('never crowds its ticks', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 99 }),
        fc.integer({ min: 101, max: 200 }),
        fc.integer({ min: 160, max: 900 }),
        (low, high, width) => {
          const ticks = ruleTicks({ low, high }, width);
          const scale = ruleScale({ low, high }, width);
          for (const [index, tick] of ticks.entries()) {
            const before = ticks[index - 1];
            if (before) expect(scale.x(tick.percent) - scale.x(before.percent)).toBeGreaterThan(6.9);
          }
        },
      ),
    );
  });
});

describe('labels on the melt rule', () => {
  it('stand alone in the lowest lane', () => {
    expect(
      placeLabels([{ key: 'price', text: 'price 98.20 %', x: 100, hasLeader: true }], 500)[0]?.lane,
    ).toBe(0);
  });

  it('let the text of the band move aside where it fits on neither side of the band', () => {
    const band = { key: 'band', text: '95 % range 99.96 to 100.04 %', x: 160, hasLeader: false };
    const [label] = placeLabels([band], 246);
    expect(label?.left).toBeGreaterThanOrEqual(0);
    expect(label?.right).toBeLessThanOrEqual(246);
  });

  it('keep clear of each other and of the edges, wherever four marks and a band stand', () => {
    const x = fc.integer({ min: 10, max: 550 });
    fc.assert(
      fc.property(fc.tuple(x, x, x, x), ([price, reserve, limit, band]) => {
        const requests: LabelRequest[] = [
          { key: 'price', text: 'price 98.20 %', x: price, hasLeader: true },
          { key: 'reserve', text: 'reserve 95.00 %', x: reserve, hasLeader: true },
          { key: 'limit', text: 'your limit 96.20 %', x: limit, hasLeader: true },
          { key: 'band', text: '95 % range 99.96 to 100.04 %', x: band, hasLeader: false },
        ];
        // Marks closer than a leader's clearance cannot both be led to without touching.
        const sorted = [price, reserve, limit, band].sort((a, b) => a - b);
        fc.pre(sorted.every((value, index) => index === 0 || value - (sorted[index - 1] ?? 0) >= 12));
        const labels = placeLabels(requests, 560);
        expect(labels).toHaveLength(4);
        for (const label of labels) {
          expect(label.left).toBeGreaterThanOrEqual(0);
          expect(label.right).toBeLessThanOrEqual(560);
          for (const other of labels) if (other !== label) expect(touch(label, other)).toBe(false);
        }
      }),
    );
  });
});
