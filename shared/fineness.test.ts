import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ratio, rational, times, toPlaces } from './testing/rational.ts';
import { dec, fixed, plain, roundToStep } from './decimal.ts';
import { MeasureError } from './domain-error.ts';
import {
  FINENESS_UNITS,
  WHOLE_OF_UNIT,
  assertTotalWithinWhole,
  finenessText,
  fractionValue,
  fromPermille,
  isFinenessUnit,
  roundDownToStandard,
  toFraction,
  toPermille,
  totalPermille,
  type FinenessEntry,
  type FinenessUnit,
} from './fineness.ts';
import { FINENESS_STANDARDS, markOfFineness } from './mark-of-fineness.ts';
import { fromGrams, toGrams } from './mass.ts';
import { METALS } from './metals.ts';

function refusal(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return `${error.code} at ${error.field}`;
    throw error;
  }
  return 'accepted';
}

const permille = (value: string, unit: FinenessUnit) => toPermille({ value, unit });

describe('karat, n/24 exactly (computed)', () => {
  it.each([
    ['8', '333.33'],
    ['9', '375.00'],
    ['10', '416.67'],
    ['12', '500.00'],
    ['14', '583.33'],
    ['15', '625.00'],
    ['18', '750.00'],
    ['20', '833.33'],
    ['21', '875.00'],
    ['22', '916.67'],
    ['23', '958.33'],
    ['24', '1000.00'],
  ])('has %s karat at %s ‰', (karat, expected) => {
    expect(fixed(permille(karat, 'karat'), 2)).toBe(expected);
  });

  it('keeps 585 and 14 karat two entries: ISO/EU “585” is above 14/24 (US “14K” means 583.3)', () => {
    expect(permille('585', 'permille').gt(permille('14', 'karat'))).toBe(true);
    expect(fixed(permille('14', 'karat'), 1)).toBe('583.3');
  });

  it('keeps thirds exact: 24 g of 14 karat hold 14 g, not a digit less', () => {
    const { numerator, denominator } = toFraction({ value: '14', unit: 'karat' });
    expect(plain(dec('24').times(numerator).div(denominator))).toBe('14');
  });
});

describe('one fineness in every unit', () => {
  it.each<[string, FinenessUnit, string]>([
    ['916.7', 'permille', '916.7'],
    ['91.67', 'percent', '916.7'],
    ['916700', 'gpt', '916.7'],
    ['18', 'karat', '750'],
    ['180', 'gpt', '0.18'],
    ['999.9', 'permille', '999.9'],
  ])('reads %s %s as %s ‰', (value, unit, expected) => {
    expect(plain(permille(value, unit))).toBe(expected);
  });

  it('comes back the same through parts per thousand', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...FINENESS_UNITS),
        fc.bigInt({ min: 1n, max: 24_000_000n }),
        (unit, millionths) => {
          const value = toPlaces(ratio(millionths, 1_000_000n), 6);
          const back = fromPermille(permille(value, unit), unit);
          expect(fixed(back, 6)).toBe(value);
          expect(fixed(fractionValue(toFraction({ value, unit })), 12)).toBe(
            toPlaces(times(rational(value), ratio(1n, BigInt(WHOLE_OF_UNIT[unit]))), 12),
          );
        },
      ),
    );
  });

  it('is written with its unit', () => {
    expect(finenessText({ value: '916.7', unit: 'permille' })).toBe('916.7 ‰');
    expect(finenessText({ value: '14', unit: 'karat' })).toBe('14 karat');
    expect(finenessText({ value: '180', unit: 'gpt' })).toBe('180 g/t');
    expect(isFinenessUnit('percent')).toBe(true);
    expect(isFinenessUnit('carat')).toBe(false);
  });
});

describe('bounds', () => {
  it.each<[string, unknown, string]>([
    ['0', 'permille', 'fineness-too-low at /f/value'],
    ['0.000000', 'karat', 'fineness-too-low at /f/value'],
    ['-1', 'permille', 'fineness-too-low at /f/value'],
    ['1000', 'permille', 'accepted'],
    ['1000.1', 'permille', 'fineness-too-high at /f/value'],
    ['24', 'karat', 'accepted'],
    ['25', 'karat', 'fineness-too-high at /f/value'],
    ['24.000001', 'karat', 'fineness-too-high at /f/value'],
    ['100', 'percent', 'accepted'],
    ['100.01', 'percent', 'fineness-too-high at /f/value'],
    ['1000000', 'gpt', 'accepted'],
    ['1000001', 'gpt', 'fineness-too-high at /f/value'],
    ['916,7', 'permille', 'decimal-comma at /f/value'],
    ['916.7777777', 'permille', 'too-many-decimals at /f/value'],
    ['585', undefined, 'unit-missing at /f/unit'],
    ['585', '', 'unit-missing at /f/unit'],
    ['585', 'fine', 'unit-unknown at /f/unit'],
  ])('answers for %s %s: %s', (value, unit, expected) => {
    expect(refusal(() => toFraction({ value, unit } as FinenessEntry, '/f'))).toBe(expected);
  });
});

describe('total of fractions', () => {
  const fractions = (...entries: [string, FinenessUnit][]) =>
    entries.map(([value, unit]) => toFraction({ value, unit }));

  it('adds different units exactly', () => {
    expect(plain(totalPermille(fractions(['14', 'karat'], ['10', 'karat'])))).toBe('1000');
    expect(plain(totalPermille(fractions(['8', 'karat'], ['8', 'karat'], ['8', 'karat'])))).toBe('1000');
    expect(plain(totalPermille(fractions(['50', 'percent'], ['500', 'permille'])))).toBe('1000');
    expect(plain(totalPermille([]))).toBe('0');
  });

  it('takes exactly the whole and refuses anything above', () => {
    const whole = fractions(['999.999', 'permille'], ['1', 'gpt']);
    expect(refusal(() => assertTotalWithinWhole(whole, '/contents'))).toBe('accepted');
    const more = fractions(['999.999', 'permille'], ['1.000001', 'gpt']);
    expect(refusal(() => assertTotalWithinWhole(more, '/contents'))).toBe(
      'fractions-over-whole at /contents',
    );
  });
});

describe('rounding down to a standard', () => {
  it.each<[string, string | null, string]>([
    ['588', '585', 'Finnish safety authority, fineness page, read'],
    ['584', '375', 'Finnish safety authority, fineness page, read'],
    ['585', '585', 'ISO 9202: a minimum, no minus tolerance (catalogue text), read'],
    ['584.999', '375', 'ISO 9202: a minimum, no minus tolerance (catalogue text), read'],
    ['916.67', '916', 'ISO 9202: “916” is truncated, not rounded'],
    ['999.9', '999', 'Hallmarking Act 1973 list, from memory'],
    ['374.9', null, 'below every standard'],
  ])('marks gold of %s ‰ as %s (%s)', (value, mark) => {
    expect(markOfFineness('Au', dec(value))).toBe(mark);
  });

  it('knows the standards of the other metals (Hallmarking Act 1973 and ISO 9202:2014 Table 1, from memory)', () => {
    expect(markOfFineness('Ag', dec('930'))).toBe('925');
    expect(markOfFineness('Ag', dec('834'), 'iso')).toBe('830');
    expect(markOfFineness('Pt', dec('949.9'))).toBe('900');
    expect(markOfFineness('Pd', dec('949.9'))).toBe('500');
    expect(markOfFineness('Au', dec('417'), 'iso')).toBe('417');
  });

  it('never exceeds what is there, and passes over no higher standard', () => {
    fc.assert(
      fc.property(fc.constantFrom(...METALS), fc.integer({ min: 1, max: 10_000 }), (metal, tenths) => {
        const value = dec(BigInt(tenths)).div(10);
        const standards = FINENESS_STANDARDS.hallmark[metal];
        const mark = markOfFineness(metal, value);
        if (mark !== null) expect(value.gte(mark)).toBe(true);
        const passed = standards.filter((standard) => value.gte(standard));
        expect(passed.length === 0 ? mark : passed.at(-1)).toBe(mark);
      }),
    );
  });

  it('does not depend on the order of the list', () => {
    expect(roundDownToStandard(dec('800'), ['999', '375', '750', '585'])).toBe('750');
  });
});

describe('stamping tolerances (computed)', () => {
  const limit = (whole: string, tolerance: string) => dec(whole).minus(tolerance);

  it('passes US 14K at 580.4 and fails it at 580.3 (15 USC 295, 3/1000 without solder; amendment note read)', () => {
    const bare = permille('14', 'karat').minus(3);
    expect(fixed(bare, 3)).toBe('580.333');
    expect([dec('580.4').gte(bare), dec('580.3').gte(bare)]).toEqual([true, false]);
  });

  it('passes a whole piece with solder at 576.4 and fails it at 576.3 (15 USC 295, 7/1000; amendment note read)', () => {
    const whole = permille('14', 'karat').minus(7);
    expect(fixed(whole, 3)).toBe('576.333');
    expect([dec('576.4').gte(whole), dec('576.3').gte(whole)]).toEqual([true, false]);
  });

  it('passes sterling at 921.0 and fails it at 920.9 (15 USC 296, from memory)', () => {
    expect([dec('921.0').gte(limit('925', '4')), dec('920.9').gte(limit('925', '4'))]).toEqual([true, false]);
  });
});

describe('Good Delivery bars (London Good Delivery Rules, Annex C)', () => {
  const fine = (grossOunces: string, fineness: string) => {
    const { numerator, denominator } = toFraction({ value: fineness, unit: 'permille' });
    return dec(grossOunces).times(numerator).div(denominator);
  };

  it.each([
    ['401.125', '995.8', '399.440275', '399.440', 'published example, Annex C, read'],
    ['400.000', '995.0', '398', '398.000', 'computed'],
    ['412.675', '999.9', '412.6337325', '412.634', 'computed'],
    ['1164.9', '999.0', '1163.7351', '1163.735', 'weights published in Annex C, product computed'],
  ])('has of %s oz t at %s ‰ exactly %s, shown %s fine (%s)', (gross, fineness, product, shown) => {
    expect(plain(fine(gross, fineness))).toBe(product);
    expect(fixed(fine(gross, fineness), 3)).toBe(shown);
  });

  it.each([
    ['12.4765', '0.025', '401.128790', '401.125', '995.8', '399.440'],
    ['31.250', '0.1', '1004.710830', '1004.7', '999.0', '1003.695'],
  ])(
    'rounds %s kg down to a step of %s oz t (computed)',
    (kilograms, step, exact, gross, fineness, shown) => {
      const ounces = fromGrams(toGrams({ value: kilograms, unit: 'kg' }), 'ozt');
      expect(fixed(ounces, 6)).toBe(exact);
      expect(plain(roundToStep(ounces, dec(step), 'towards-zero'))).toBe(gross);
      expect(fixed(fine(gross, fineness), 3)).toBe(shown);
    },
  );
});
