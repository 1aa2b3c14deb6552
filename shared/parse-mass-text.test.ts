import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { MeasureError } from './domain-error.ts';
import { parseDecimal } from './decimal.ts';
import { parseMassText } from './parse-mass-text.ts';

function answerTo(text: string): string {
  try {
    return parseMassText(text, '/gross/value');
  } catch (error) {
    if (error instanceof MeasureError) return `${error.code} at ${error.field}`;
    throw error;
  }
}

describe('what a person may type', () => {
  it.each([
    ['12.5', '12.5'],
    ['12,5', '12.5'],
    ['  12.50 ', '12.50'],
    ['12,50', '12.50'],
    ['1 1/4', '1.25'],
    ['3/8', '0.375'],
    ['1 234 1/2', '1234.5'],
    ['1 234.5', '1234.5'],
    ['1 234,5', '1234.5'],
    ['1\u00a0234,5', '1234.5'],
    ['1\u202f234\u202f567', '1234567'],
    ['1 234,567', '1234.567'],
    ['1,234.5', '1234.5'],
    ['1.234,5', '1234.5'],
    ['1,234,567', '1234567'],
    ['1.234.567', '1234567'],
    ['1,234,567.8', '1234567.8'],
    ['1.234', '1.234'],
    ['0,125', '0.125'],
    ['1234,567', '1234.567'],
    ['1,23', '1.23'],
    ['1,2345', '1.2345'],
    ['007.5', '7.5'],
    ['0', '0'],
    ['00', '0'],
  ])('reads %j as %s', (text, expected) => {
    expect(answerTo(text)).toBe(expected);
  });

  it.each(['1,234', '12,345', '999,000'])('refuses %s, which could be either', (text) => {
    expect(answerTo(text)).toBe('number-ambiguous at /gross/value');
  });

  it('says plainly what the two readings are', () => {
    expect(() => parseMassText('1,234')).toThrow(
      'Is 1,234 1.234 or 1234? Write it with a dot, or without the comma.',
    );
  });

  it.each([
    ['', 'number-missing'],
    ['   ', 'number-missing'],
    ['abc', 'not-a-decimal'],
    ['-5', 'not-a-decimal'],
    ['+5', 'not-a-decimal'],
    ['1e3', 'not-a-decimal'],
    ['5 g', 'not-a-decimal'],
    ['1 2', 'not-a-decimal'],
    ['1 23.4', 'not-a-decimal'],
    ['12 3456', 'not-a-decimal'],
    ['1.5 234', 'not-a-decimal'],
    ['1,23,456', 'not-a-decimal'],
    ['1..5', 'not-a-decimal'],
    ['1,5.2.3', 'not-a-decimal'],
    ['1.2,3.4', 'not-a-decimal'],
    ['.5', 'not-a-decimal'],
    ['5,', 'not-a-decimal'],
    ['5.', 'not-a-decimal'],
    ['1/0', 'not-a-decimal'],
    ['1.5/2', 'not-a-decimal'],
    ['1/3', 'fraction-not-exact'],
    ['1 1/7', 'fraction-not-exact'],
    ['1/128', 'fraction-not-exact'],
  ])('refuses %j as %s', (text, code) => {
    expect(answerTo(text)).toBe(`${code} at /gross/value`);
  });
});

describe('properties', () => {
  it('leaves plain decimals as they are', () => {
    const plainText = fc
      .tuple(fc.bigInt({ min: 0n, max: 10n ** 9n }), fc.stringMatching(/^\d{0,6}$/))
      .map(([whole, decimals]) => (decimals === '' ? whole.toString() : `${whole}.${decimals}`));
    fc.assert(
      fc.property(plainText, (text) => {
        expect(parseMassText(text)).toBe(text);
      }),
    );
  });

  it('answers plain notation that the API takes, or refuses with a reason; never anything else', () => {
    const keys = fc.string({ unit: fc.constantFrom(...'0123456789., /-e '.split('')), maxLength: 14 });
    fc.assert(
      fc.property(keys, (text) => {
        let read: string;
        try {
          read = parseMassText(text);
        } catch (error) {
          expect(error).toBeInstanceOf(MeasureError);
          return;
        }
        expect(() => parseDecimal(read)).not.toThrow();
      }),
      { numRuns: 2000 },
    );
  });

  it('reads a comma and a dot alike wherever both are clear', () => {
    const decimals = fc.stringMatching(/^(\d{1,2}|\d{4,6})$/);
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 99_999 }), decimals, (whole, rest) => {
        expect(parseMassText(`${whole},${rest}`)).toBe(parseMassText(`${whole}.${rest}`));
      }),
    );
  });
});
