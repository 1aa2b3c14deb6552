import { describe, expect, it } from 'vitest';
import { shortQuoteNumber } from './quote-number.ts';

describe('shortQuoteNumber', () => {
  it('keeps the last eight signs, and a short id whole', () => {
    expect(shortQuoteNumber('0193ad1c-77d0-7e0b-9f5a-1c2ba87298d8')).toBe('a87298d8');
    expect(shortQuoteNumber('7')).toBe('7');
  });
});
