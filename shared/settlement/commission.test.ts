import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MeasureError } from '../domain-error.ts';
import { commissionFor, explainCommission } from './commission.ts';
import { isBelowFloor, percentOfMelt, priceAtPercentOfMelt } from './percent-of-melt.ts';

function codeOf(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return error.code;
    throw error;
  }
  return 'accepted';
}

describe('commission', () => {
  it.each([
    ['a card at 4 %', 412_135n, '4', 16_485n, 'percent'],
    ['a bank debit at 1.5 %', 412_135n, '1.5', 6_182n, 'percent'],
    ['half a cent, away from zero', 50_100n, '1.5', 752n, 'percent'],
    ['exactly the minimum', 5_000n, '4', 200n, 'percent'],
    ['the lowest price, lifted', 2_000n, '4', 200n, 'minimum'],
    ['a cent under the minimum, lifted', 4_987n, '4', 200n, 'minimum'],
    ['a price below the minimum', 150n, '4', 150n, 'price'],
    ['no price', 0n, '4', 0n, 'price'],
    ['no percentage', 10_000n, '0', 200n, 'minimum'],
    ['all of it', 10_000n, '100', 10_000n, 'percent'],
  ] as const)('of %s', (_, priceMinor, percent, minor, rule) => {
    expect(commissionFor(priceMinor, { percent, minimumMinor: 200n })).toBe(minor);
    expect(explainCommission(priceMinor, { percent, minimumMinor: 200n })).toMatchObject({ minor, rule });
  });

  it('is never below zero, never above the price, and grows with the price', () => {
    const price = fc.bigInt({ min: 0n, max: 10n ** 11n });
    const percent = fc.integer({ min: 0, max: 100 }).map(String);
    fc.assert(
      fc.property(
        price,
        price,
        percent,
        fc.bigInt({ min: 0n, max: 5_000n }),
        (left, right, rate, minimumMinor) => {
          const [low, high] = left < right ? [left, right] : [right, left];
          const terms = { percent: rate, minimumMinor };
          const [small, large] = [commissionFor(low, terms), commissionFor(high, terms)];
          expect(small >= 0n && small <= low).toBe(true);
          expect(small <= large).toBe(true);
        },
      ),
    );
  });

  it('refuses what cannot be a commission', () => {
    expect(codeOf(() => commissionFor(-1n, { percent: '4', minimumMinor: 200n }))).toBe('price-negative');
    expect(codeOf(() => commissionFor(1n, { percent: '4', minimumMinor: -1n }))).toBe('minimum-negative');
    expect(codeOf(() => commissionFor(1n, { percent: '100.1', minimumMinor: 0n }))).toBe('too-large');
    expect(codeOf(() => commissionFor(1n, { percent: '-1', minimumMinor: 0n }))).toBe('too-small');
    expect(codeOf(() => commissionFor(1n, { percent: '1,5', minimumMinor: 0n }))).toBe('decimal-comma');
  });
});

describe('percent of melt', () => {
  it.each([
    [98_200n, 100_000n, '98.20'],
    [100_000n, 100_000n, '100.00'],
    [1n, 3n, '33.33'],
    [2n, 3n, '66.67'],
    [19_999n, 200_000n, '10.00'],
    [105_000n, 100_000n, '105.00'],
    [0n, 100n, '0.00'],
  ])('shows %s of %s as %s', (price, melt, percent) => {
    expect(percentOfMelt(price, melt)).toBe(percent);
  });

  it('has no percentage of nothing', () => {
    expect(percentOfMelt(100n, 0n)).toBeNull();
  });

  it('makes a percentage a sum, rounded once', () => {
    expect(priceAtPercentOfMelt(72_738n, '98.2')).toBe(71_429n);
    expect(priceAtPercentOfMelt(100n, '0.5')).toBe(1n);
    expect(codeOf(() => priceAtPercentOfMelt(100n, 'all'))).toBe('not-a-decimal');
  });

  it('compares with the floor exactly, not by the rounded percentage', () => {
    expect(isBelowFloor(97_000n, 100_000n, '97')).toBe(false);
    expect(isBelowFloor(96_999n, 100_000n, '97')).toBe(true);
    expect(percentOfMelt(969_999_999n, 1_000_000_000n)).toBe('97.00');
    expect(isBelowFloor(969_999_999n, 1_000_000_000n, '97')).toBe(true);
    expect(isBelowFloor(0n, 0n, '97')).toBe(false);
    expect(codeOf(() => isBelowFloor(1n, 1n, '-1'))).toBe('too-small');
  });
});
