import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dec, fixed, type Dec } from './decimal.ts';
import { GRAMS_PER_TROY_OUNCE } from './mass.ts';
import {
  classLimitInService,
  combine,
  massUncertainty,
  readabilityUncertainty,
  rss,
  type BalanceClass,
} from './uncertainty.ts';

/** u, rounded to so many significant digits, as a guide prints it. */
const significant = (value: Dec, digits: number) => value.toSignificantDigits(digits).toFixed();

describe('published check: EURACHEM/CITAC QUAM Example A1, calibration standard (read)', () => {
  // c = 1000·m·P/V with m = 100.28 mg (u 0.05), P = 0.9999 (u 0.000058), V = 100.0 mL (u 0.07).
  const mass = dec('100.28');
  const purity = dec('0.9999');
  const volume = dec('100.0');
  const concentration = mass.times(purity).times(1000).div(volume);
  const combined = (volumeUncertainty: string) =>
    combine([
      { input: 'm', sensitivity: concentration.div(mass), standard: dec('0.05') },
      { input: 'P', sensitivity: concentration.div(purity), standard: dec('0.000058') },
      { input: 'V', sensitivity: concentration.div(volume), standard: dec(volumeUncertainty) },
    ]);

  it('gives 1002.7 mg/L with u = 0.9, relative 0.0009, as published', () => {
    const { standard } = combined('0.07');
    expect(fixed(concentration, 1)).toBe('1002.7');
    expect(fixed(standard, 1)).toBe('0.9');
    expect(significant(standard.div(concentration), 1)).toBe('0.0009');
  });

  it('gives the full digits computed from the published inputs', () => {
    const { standard } = combined('0.07');
    expect(fixed(concentration, 5)).toBe('1002.69972');
    expect(significant(standard.div(concentration), 6)).toBe('0.000861377');
    expect(fixed(standard, 6)).toBe('0.863703');
    expect(fixed(combined('0.066').standard, 4)).toBe('0.8314');
  });
});

describe('the product’s own case: 125.40 g at 585.0 ‰ (computed)', () => {
  const fine = (readability: string, expandedFraction: string) =>
    combine([
      { input: 'mass', sensitivity: dec('0.5850'), standard: readabilityUncertainty(dec(readability)) },
      { input: 'assay', sensitivity: dec('125.40'), standard: dec(expandedFraction).div(2) },
    ]);

  it('has a mass uncertainty of 0.002887 g on a 0.01 g display', () => {
    expect(fixed(readabilityUncertainty(dec('0.01')), 6)).toBe('0.002887');
  });

  it('has 73.359 g fine, u 0.0627, U 0.1254 g', () => {
    const { standard, expanded } = fine('0.01', '0.001');
    expect(fixed(dec('125.40').times('0.5850'), 3)).toBe('73.359');
    expect(fixed(standard, 4)).toBe('0.0627');
    expect(fixed(expanded, 4)).toBe('0.1254');
  });

  it('has U 0.1299 g on a 0.1 g display: the assay, not the scale, dominates', () => {
    const { expanded, shares } = fine('0.1', '0.001');
    expect(fixed(expanded, 4)).toBe('0.1299');
    expect(shares.map(({ input }) => input)).toEqual(['mass', 'assay']);
    expect(dec(shares[1]?.percent ?? '0').gt(90)).toBe(true);
  });

  it('has with XRF (10 ‰) U = 1.254 g, 80.63 $ at 2000 $/oz t', () => {
    const { expanded } = fine('0.01', '0.010');
    expect(fixed(expanded, 3)).toBe('1.254');
    expect(fixed(expanded.times(2000).div(GRAMS_PER_TROY_OUNCE), 2)).toBe('80.63');
  });
});

describe('balance classes (OIML R 76-1 Tables 3 and 6, read second-hand)', () => {
  it('has in service ±0.02 g for class II at 125.40 g with e = 0.01 g (12 540 e; computed)', () => {
    expect(fixed(classLimitInService('II', dec('0.01'), dec('125.40')), 2)).toBe('0.02');
  });

  it.each<[BalanceClass, string, string]>([
    ['I', '50000', '1'],
    ['I', '50001', '2'],
    ['I', '200000', '2'],
    ['I', '200001', '3'],
    ['II', '5000', '1'],
    ['II', '5001', '2'],
    ['II', '20000', '2'],
    ['II', '20001', '3'],
    ['III', '500', '1'],
    ['III', '501', '2'],
    ['III', '2000', '2'],
    ['III', '2001', '3'],
  ])('allows class %s at a load of %s e an error of %s e in service', (balanceClass, load, limit) => {
    expect(fixed(classLimitInService(balanceClass, dec('1'), dec(load)), 0)).toBe(limit);
  });

  it('takes the larger of readability and class limit', () => {
    const byReadability = massUncertainty(dec('125.40'), dec('0.01'), null);
    const byClass = massUncertainty(dec('125.40'), dec('0.01'), 'II');
    expect(fixed(byReadability, 6)).toBe('0.002887');
    expect(fixed(byClass, 6)).toBe(fixed(dec('0.02').div(dec('3').sqrt()), 6));
    expect(byClass.gt(byReadability)).toBe(true);
  });
});

describe('law of propagation', () => {
  it('squares, sums and takes the root', () => {
    expect(rss([dec('3'), dec('4')]).toFixed()).toBe('5');
    expect(rss([]).toFixed()).toBe('0');
  });

  it('has shares of 36.0 and 64.0 % for parts of 3 and 4, whatever their sign', () => {
    const { shares } = combine([
      { input: 'a', sensitivity: dec('-3'), standard: dec('1') },
      { input: 'b', sensitivity: dec('1'), standard: dec('4') },
    ]);
    expect(shares).toEqual([
      { input: 'a', percent: '36.0' },
      { input: 'b', percent: '64.0' },
    ]);
  });

  it('has no shares where nothing is uncertain', () => {
    const { expanded, shares } = combine([{ input: 'a', sensitivity: dec('1'), standard: dec('0') }]);
    expect(expanded.toFixed()).toBe('0');
    expect(shares).toEqual([{ input: 'a', percent: '0.0' }]);
  });

  it('adds up to 100.0 % and never falls below its largest part', () => {
    const part = fc.record({
      sensitivity: fc.integer({ min: -999, max: 999 }),
      standard: fc.integer({ min: 0, max: 999 }),
    });
    fc.assert(
      fc.property(fc.array(part, { minLength: 1, maxLength: 6 }), (parts) => {
        const inputs = parts.map(({ sensitivity, standard }, index) => ({
          input: String(index),
          sensitivity: dec(BigInt(sensitivity)),
          standard: dec(BigInt(standard)),
        }));
        const { standard, expanded, shares } = combine(inputs);
        fc.pre(standard.gt(0));
        expect(shares.reduce((sum, { percent }) => sum.plus(percent), dec('0')).toFixed(1)).toBe('100.0');
        expect(expanded.eq(standard.times(2))).toBe(true);
        for (const input of inputs) {
          expect(standard.gte(input.sensitivity.times(input.standard).abs().minus('1e-40'))).toBe(true);
        }
      }),
    );
  });
});
