import fc from 'fast-check';
import { Decimal } from 'decimal.js';
import { describe, expect, it } from 'vitest';
import { rational, toPlaces } from './testing/rational.ts';
import {
  Dec,
  compareDecimals,
  cut,
  dec,
  decimalsTyped,
  fixed,
  lastDigitOf,
  parseDecimal,
  plain,
  roundToStep,
} from './decimal.ts';
import { MeasureError } from './domain-error.ts';

const plainDecimal = fc
  .tuple(fc.boolean(), fc.bigInt({ min: 0n, max: 10n ** 18n }), fc.integer({ min: 0, max: 12 }))
  .map(([isNegative, digits, places]) => {
    const text = digits.toString().padStart(places + 1, '0');
    const body = places === 0 ? text : `${text.slice(0, -places)}.${text.slice(-places)}`;
    return isNegative && digits !== 0n ? `-${body}` : body;
  });

function codeOf(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return error.code;
    throw error;
  }
  return 'accepted';
}

describe('the private clone', () => {
  it('is apart from the library default, which keeps its own settings', () => {
    expect(Dec).not.toBe(Decimal);
    expect(Decimal.precision).toBe(20);
    expect(Dec.precision).toBe(60);
    expect(Dec.rounding).toBe(Decimal.ROUND_HALF_UP);
  });

  it('carries 60 significant digits', () => {
    expect(dec('1').div(3).toFixed()).toBe(`0.${'3'.repeat(60)}`);
  });

  it('never writes an exponent', () => {
    expect(dec('0.000000000000000000001').toString()).toBe('0.000000000000000000001');
    expect(dec(10n ** 40n).toString()).toBe(`1${'0'.repeat(40)}`);
  });

  it('adds a tenth and two tenths to exactly three tenths', () => {
    expect(dec('0.1').plus('0.2').eq('0.3')).toBe(true);
    expect(dec('585.5').minus('585.0').eq('0.5')).toBe(true);
  });
});

describe('parseDecimal', () => {
  it.each(['0', '7', '12.34', '0.000001', '-3.5', '100', '0.10', '99999999999999999999.999999'])(
    'reads %s',
    (text) => {
      expect(parseDecimal(text).toFixed(decimalsTyped(text))).toBe(text);
    },
  );

  it.each([
    ['', 'not-a-decimal'],
    [' 1', 'not-a-decimal'],
    ['1 ', 'not-a-decimal'],
    ['+1', 'not-a-decimal'],
    ['.5', 'not-a-decimal'],
    ['5.', 'not-a-decimal'],
    ['007', 'not-a-decimal'],
    ['1e9', 'not-a-decimal'],
    ['0x10', 'not-a-decimal'],
    ['NaN', 'not-a-decimal'],
    ['Infinity', 'not-a-decimal'],
    ['1.2.3', 'not-a-decimal'],
    ['--1', 'not-a-decimal'],
    ['１２', 'not-a-decimal'],
    ['1_000', 'not-a-decimal'],
    ['12\n', 'not-a-decimal'],
    ['12,34', 'decimal-comma'],
    ['1.234,5', 'decimal-comma'],
    ['9'.repeat(41), 'number-too-long'],
  ])('refuses %j as %s', (text, code) => {
    expect(codeOf(() => parseDecimal(text))).toBe(code);
  });

  it('refuses a JavaScript number that slipped past the types', () => {
    expect(codeOf(() => parseDecimal(12.34 as unknown as string))).toBe('not-a-decimal');
  });

  it('holds its bounds, inclusive and exclusive', () => {
    expect(codeOf(() => parseDecimal('0', { above: '0' }))).toBe('too-small');
    expect(codeOf(() => parseDecimal('0.000001', { above: '0' }))).toBe('accepted');
    expect(codeOf(() => parseDecimal('-0.1', { min: '0' }))).toBe('too-small');
    expect(codeOf(() => parseDecimal('0', { min: '0' }))).toBe('accepted');
    expect(codeOf(() => parseDecimal('5', { max: '5' }))).toBe('accepted');
    expect(codeOf(() => parseDecimal('5.1', { max: '5' }))).toBe('too-large');
    expect(codeOf(() => parseDecimal('5', { below: '5' }))).toBe('too-large');
    expect(codeOf(() => parseDecimal('4.9', { below: '5' }))).toBe('accepted');
  });

  it('counts the digits typed, trailing zeros included', () => {
    expect(codeOf(() => parseDecimal('1.000000', { maxDecimals: 6 }))).toBe('accepted');
    expect(codeOf(() => parseDecimal('1.0000000', { maxDecimals: 6 }))).toBe('too-many-decimals');
  });

  it('names the field that it was given', () => {
    expect(() => parseDecimal('x', { field: '/mass/value' })).toThrowError(
      expect.objectContaining({
        field: '/mass/value',
        issues: [expect.objectContaining({ field: '/mass/value' })],
      }),
    );
  });

  it('gives back what plain notation wrote', () => {
    fc.assert(
      fc.property(plainDecimal, (text) => {
        const value = parseDecimal(text);
        expect(parseDecimal(plain(value)).eq(value)).toBe(true);
      }),
    );
  });
});

describe('rounding', () => {
  it.each([
    ['0.005', 2, '0.01'],
    ['-0.005', 2, '-0.01'],
    ['1.005', 2, '1.01'],
    ['2.5', 0, '3'],
    ['-2.5', 0, '-3'],
    ['-0.004', 2, '0.00'],
    ['399.440275', 3, '399.440'],
  ])('rounds %s to %i places as %s, half away from zero', (text, places, expected) => {
    expect(fixed(dec(text), places)).toBe(expected);
  });

  it('agrees with exact fractions on BigInt', () => {
    fc.assert(
      fc.property(plainDecimal, fc.integer({ min: 0, max: 6 }), (text, places) => {
        expect(fixed(dec(text), places).replace(/^-(?=0(\.0*)?$)/, '')).toBe(
          toPlaces(rational(text), places).replace(/^-(?=0(\.0*)?$)/, ''),
        );
      }),
    );
  });

  it('cuts towards zero for showing', () => {
    expect(cut(dec('1.99999'), 2)).toBe('1.99');
    expect(cut(dec('-1.99999'), 2)).toBe('-1.99');
  });

  it('never writes a negative zero', () => {
    expect(plain(dec('-0'))).toBe('0');
    expect(fixed(dec('-0.0001'), 2)).toBe('0.00');
  });

  it('rounds to a step, named towards zero or half away', () => {
    expect(plain(roundToStep(dec('401.12879'), dec('0.025'), 'towards-zero'))).toBe('401.125');
    expect(plain(roundToStep(dec('401.1375'), dec('0.025')))).toBe('401.15');
    expect(plain(roundToStep(dec('-0.0375'), dec('0.025')))).toBe('-0.05');
    expect(codeOf(() => roundToStep(dec('1'), dec('0')))).toBe('step-not-positive');
  });

  it('answers a whole multiple of the step, at most half a step away', () => {
    fc.assert(
      fc.property(plainDecimal, fc.integer({ min: 1, max: 5000 }), (text, thousandths) => {
        const step = dec(BigInt(thousandths)).div(1000);
        const rounded = roundToStep(dec(text), step);
        expect(rounded.div(step).isInteger()).toBe(true);
        expect(rounded.minus(text).abs().times(2).lte(step)).toBe(true);
      }),
    );
  });
});

describe('text of a number', () => {
  it.each([
    ['12.34', 2, '0.01'],
    ['12.30', 2, '0.01'],
    ['12', 0, '1'],
    ['0.000001', 6, '0.000001'],
  ])('finds in %s %i decimals and a last digit of %s', (text, decimals, step) => {
    expect(decimalsTyped(text)).toBe(decimals);
    expect(plain(lastDigitOf(text))).toBe(step);
  });

  it('compares strings by value', () => {
    expect(compareDecimals('1.10', '1.1')).toBe(0);
    expect(compareDecimals('9', '10')).toBe(-1);
    expect(compareDecimals('-1', '-2')).toBe(1);
  });
});
