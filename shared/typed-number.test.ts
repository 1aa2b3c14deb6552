import { describe, expect, it } from 'vitest';
import { MeasureError } from './domain-error.ts';
import { typedDecimal, typedNumber } from './typed-number.ts';

function refusal(step: () => string): string {
  try {
    return `read as ${step()}`;
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    return `${error.code} at ${error.field}: ${error.message}`;
  }
}

describe('a number as typed', () => {
  it.each([
    ['12.50', '12.50'],
    [' 12,5 ', '12.5'],
    ['1.234,5', '1234.5'],
    ['-12,5', '-12.5'],
    ['− 3', '-3'],
    ['1 1/4', '1.25'],
    ['007', '7'],
  ])('%j is read as %s', (typed, read) => {
    expect(typedNumber(typed, '/x', 'Enter it.')).toBe(read);
  });

  it('says what is missing in the words of the field', () => {
    expect(refusal(() => typedNumber('  ', '/price', 'Enter a price.'))).toBe(
      'number-missing at /price: Enter a price.',
    );
  });

  it.each([
    ['1,234', 'number-ambiguous'],
    ['-1,234', 'number-ambiguous'],
    ['--1', 'not-a-decimal'],
    ['-', 'not-a-decimal'],
    ['1e9', 'not-a-decimal'],
    ['0x10', 'not-a-decimal'],
    ['NaN', 'not-a-decimal'],
  ])('%j is refused', (typed, code) => {
    expect(refusal(() => typedNumber(typed, '/x', 'Enter it.'))).toContain(`${code} at /x`);
  });
});

describe('a sum as typed', () => {
  it('is no fraction', () => {
    expect(typedDecimal('1,5', '/x', 'Enter it.')).toBe('1.5');
    expect(refusal(() => typedDecimal('1/2', '/x', 'Enter it.'))).toContain('not-a-decimal at /x');
  });
});
