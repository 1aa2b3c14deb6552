import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { over, rational, toPlaces, times } from './testing/rational.ts';
import { dec, fixed, plain } from './decimal.ts';
import { MeasureError } from './domain-error.ts';
import {
  CANONICAL_DECIMALS,
  GRAMS_PER_TROY_OUNCE,
  GRAMS_PER_UNIT,
  MASS_UNITS,
  MASS_UNIT_LABELS,
  canonicalGrams,
  formatGrams,
  fromGrams,
  isMassUnit,
  massText,
  toGrams,
  type MassEntry,
  type MassUnit,
} from './mass.ts';
import { massInUnits } from './mass-in-units.ts';

function refusal(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return `${error.code} at ${error.field}`;
    throw error;
  }
  return 'accepted';
}

const gramsOf = (value: string, unit: MassUnit) => plain(toGrams({ value, unit }));

describe('exact factors', () => {
  // Anchor: international pound 0.45359237 kg (NIST SP 811 App. B; NIST Handbook 44 App. C), 7000 grains.
  const POUND = rational('453.59237');
  const GRAIN = over(POUND, rational('7000'));

  it.each<[MassUnit, string, string]>([
    ['gr', '0.06479891', 'NIST SP 811 App. B.8, read second-hand'],
    ['dwt', '1.55517384', 'NIST Handbook 44 App. C, computed from the anchor'],
    ['ozt', '31.1034768', 'Good Delivery Rules Annex C gives 0.0311034768 kg, read'],
    ['oz', '28.349523125', 'NIST Handbook 44 App. C, computed from the anchor'],
    ['lb', '453.59237', 'NIST Handbook 44 App. C, read second-hand'],
    ['kg', '1000', 'SI prefix'],
    ['mg', '0.001', 'SI prefix'],
    ['g', '1', 'SI'],
  ])('has one %s as %s g (%s)', (unit, grams) => {
    expect(gramsOf('1', unit)).toBe(grams);
  });

  it.each<[MassUnit, string]>([
    ['gr', '1'],
    ['dwt', '24'],
    ['ozt', '480'],
    ['oz', '437.5'],
    ['lb', '7000'],
  ])('follows for %s from %s grains of the anchor', (unit, grains) => {
    expect(toPlaces(times(GRAIN, rational(grains)), 15)).toBe(fixed(dec(GRAMS_PER_UNIT[unit]), 15));
  });

  it('has twenty pennyweights and 480 grains to the troy ounce, 5760 grains to the troy pound of 373.2417216 g', () => {
    expect(plain(dec(GRAMS_PER_UNIT.dwt).times(20))).toBe(plain(GRAMS_PER_TROY_OUNCE));
    expect(plain(dec(GRAMS_PER_UNIT.gr).times(480))).toBe(plain(GRAMS_PER_TROY_OUNCE));
    expect(plain(dec(GRAMS_PER_UNIT.gr).times(5760))).toBe('373.2417216');
    expect(plain(GRAMS_PER_TROY_OUNCE.times(12))).toBe('373.2417216');
  });
});

describe('check values computed from the factors above (NIST Handbook 44 App. C, computed)', () => {
  it.each<[string, MassUnit, MassUnit, number, string]>([
    ['1', 'kg', 'ozt', 12, '32.150746568628'],
    ['1', 'g', 'gr', 9, '15.432358353'],
    ['1', 'g', 'dwt', 9, '0.643014931'],
    ['1', 'lb', 'ozt', 6, '14.583333'],
    ['1', 'ozt', 'oz', 9, '1.097142857'],
    ['1', 'oz', 'dwt', 7, '18.2291667'],
    ['100', 'g', 'ozt', 9, '3.215074657'],
    ['400', 'ozt', 'kg', 8, '12.44139072'],
    ['1000', 'ozt', 'kg', 7, '31.1034768'],
  ])('turns %s %s into %s as published to %i places: %s', (value, from, to, places, expected) => {
    expect(fixed(fromGrams(toGrams({ value, unit: from }), to), places)).toBe(expected);
  });

  it('has a troy pound of 0.8228571 avoirdupois pounds', () => {
    expect(fixed(fromGrams(toGrams({ value: '12', unit: 'ozt' }), 'lb'), 7)).toBe('0.8228571');
  });

  it('has one troy ounce in a short ton as exactly 240/7 g/t, 34.285714', () => {
    const shortTonGrams = dec(GRAMS_PER_UNIT.lb).times(2000);
    const gramsPerTonne = GRAMS_PER_TROY_OUNCE.times(1_000_000).div(shortTonGrams);
    expect(fixed(gramsPerTonne, 6)).toBe('34.285714');
    expect(fixed(gramsPerTonne, 40)).toBe(fixed(dec('240').div(7), 40));
  });

  it('has an assay ton of 29.166667 g, 175/6', () => {
    const assayTon = dec(GRAMS_PER_UNIT.lb).times(2000).div(GRAMS_PER_TROY_OUNCE).div(1000);
    expect(fixed(assayTon, 6)).toBe('29.166667');
    expect(fixed(assayTon, 40)).toBe(fixed(dec('175').div(6), 40));
  });

  it('has ten tola of 180 grains as exactly 3.75 troy ounces', () => {
    expect(plain(fromGrams(toGrams({ value: '1800', unit: 'gr' }), 'ozt'))).toBe('3.75');
  });

  it('keeps the kitchen ounce 8.9 % below the troy ounce (the trap of a bare “oz”)', () => {
    const short = dec('1').minus(dec(GRAMS_PER_UNIT.oz).div(GRAMS_PER_TROY_OUNCE)).times(100);
    expect(fixed(short, 1)).toBe('8.9');
    expect(MASS_UNIT_LABELS.oz).toBe('oz av');
    expect(MASS_UNIT_LABELS.ozt).toBe('oz t');
  });
});

describe('toGrams', () => {
  it('keeps every unit exact within the fifteen digits of the canonical gram value', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...MASS_UNITS),
        fc.bigInt({ min: 1n, max: 1_000_000_000n }),
        (unit, millionths) => {
          const value = toPlaces({ over: millionths, under: 1_000_000n }, 6);
          const grams = toGrams({ value, unit });
          expect(grams.decimalPlaces()).toBeLessThanOrEqual(CANONICAL_DECIMALS);
          expect(canonicalGrams({ value, unit })).toBe(
            toPlaces(times(rational(value), rational(GRAMS_PER_UNIT[unit])), CANONICAL_DECIMALS),
          );
          expect(fixed(fromGrams(grams, unit), 6)).toBe(value);
        },
      ),
    );
  });

  it('writes the canonical value as DECIMAL(30,15) answers it', () => {
    expect(canonicalGrams({ value: '12.34', unit: 'g' })).toBe('12.340000000000000');
    expect(canonicalGrams({ value: '0.000001', unit: 'oz' })).toBe('0.000028349523125');
    expect(canonicalGrams({ value: '1000', unit: 'kg' })).toHaveLength(23);
  });

  it.each<[string, unknown, string]>([
    ['0', 'g', 'too-small at /mass/value'],
    ['-1', 'g', 'too-small at /mass/value'],
    ['1000000000', 'g', 'mass-too-large at /mass/value'],
    ['1e9', 'g', 'not-a-decimal at /mass/value'],
    ['0.000000000000001', 'g', 'too-many-decimals at /mass/value'],
    ['12,34', 'g', 'decimal-comma at /mass/value'],
    ['1000.000001', 'kg', 'mass-too-large at /mass/value'],
    ['1000', 'kg', 'accepted'],
    ['0.000001', 'mg', 'accepted'],
    ['1', undefined, 'unit-missing at /mass/unit'],
    ['1', '', 'unit-missing at /mass/unit'],
    ['1', 'tael', 'unit-unknown at /mass/unit'],
    ['1', 'toString', 'unit-unknown at /mass/unit'],
  ])('answers for %j %j: %s', (value, unit, expected) => {
    expect(refusal(() => toGrams({ value, unit } as MassEntry, '/mass'))).toBe(expected);
  });
});

describe('words and display', () => {
  it('writes a mass with its unit', () => {
    expect(massText({ value: '12.30', unit: 'ozt' })).toBe('12.30 oz t');
    expect(formatGrams(dec('12.3400'))).toBe('12.34');
    expect(formatGrams(dec('11.3120785'), 6)).toBe('11.312079');
    expect(isMassUnit('ozt')).toBe(true);
    expect(isMassUnit('carat')).toBe(false);
  });

  it('shows a mass in every reading unit, the reader’s own first', () => {
    expect(massInUnits(dec('31.1034768'), 'ozt')).toEqual([
      { unit: 'ozt', label: 'oz t', value: '1.000000' },
      { unit: 'g', label: 'g', value: '31.103' },
      { unit: 'dwt', label: 'dwt', value: '20.0000' },
      { unit: 'gr', label: 'gr', value: '480.00' },
    ]);
    expect(massInUnits(dec('1')).map((shown) => shown.unit)).toEqual(['g', 'ozt', 'dwt', 'gr']);
  });
});
