import { describe, expect, it } from 'vitest';
import { MeasureError } from '../domain-error.ts';
import { assertQuotesDistinct, parseRate, quoteOf } from './rate.ts';
import type { QuoteRef } from './sheet-types.ts';

const quote = (metal: string, usdPerTroyOunce: string): QuoteRef =>
  ({ id: null, metal, usdPerTroyOunce, at: null, source: 'day feed' }) as QuoteRef;

function refusal(step: () => unknown): string {
  try {
    step();
  } catch (error) {
    if (error instanceof MeasureError) return `${error.code} at ${error.field}`;
    throw error;
  }
  return 'accepted';
}

describe('a rate', () => {
  it.each([
    ['2000.00', 'accepted'],
    ['0.000001', 'accepted'],
    ['1000000', 'accepted'],
    ['0.0000001', 'too-many-decimals at /rate'],
    ['0', 'too-small at /rate'],
    ['-0.01', 'too-small at /rate'],
    ['1000000.01', 'too-large at /rate'],
    ['NaN', 'not-a-decimal at /rate'],
    ['2e3', 'not-a-decimal at /rate'],
    ['2 000.00', 'not-a-decimal at /rate'],
    ['2000,00', 'decimal-comma at /rate'],
  ])('of %s is %s', (text, expected) => {
    expect(refusal(() => parseRate(text, '/rate'))).toBe(expected);
  });
});

describe('a list of quotes', () => {
  const quotes = [quote('Ag', '25.00'), quote('Au', '2000.00')];

  it('gives the one of a metal with its rate', () => {
    const { quote: found, rate } = quoteOf(quotes, 'Au');
    expect(found).toBe(quotes[1]);
    expect(rate.toFixed()).toBe('2000');
  });

  it('points at the quote that cannot be read', () => {
    const broken = [quote('Ag', '25.00'), quote('Au', 'dear')];
    expect(refusal(() => quoteOf(broken, 'Au'))).toBe('not-a-decimal at /quotes/1/usdPerTroyOunce');
    expect(refusal(() => quoteOf(broken, 'Ag'))).toBe('accepted');
  });

  it('names the metal that has none', () => {
    expect(() => quoteOf(quotes, 'Pd')).toThrow('There is no quote for palladium.');
    expect(refusal(() => quoteOf([], 'Au'))).toBe('quote-missing at /quotes');
  });

  it('holds every metal once, and only metals that are quoted', () => {
    expect(refusal(() => assertQuotesDistinct(quotes))).toBe('accepted');
    expect(refusal(() => assertQuotesDistinct([]))).toBe('accepted');
    expect(refusal(() => assertQuotesDistinct([...quotes, quote('Ag', '26.00')]))).toBe(
      'quote-repeated at /quotes/2',
    );
    expect(refusal(() => assertQuotesDistinct([quote('Rh', '5000.00')]))).toBe(
      'metal-unknown at /quotes/0/metal',
    );
  });
});
