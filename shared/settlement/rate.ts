import { parseDecimal, type Dec } from '../decimal.ts';
import { MeasureError } from '../domain-error.ts';
import { METAL_NAMES, isMetal, type Metal } from '../metals.ts';
import type { QuoteRef } from './sheet-types.ts';

/** The highest rate that is taken, in US$ per troy ounce. */
export const RATE_MAX = '1000000';

/** Digits after the dot that a rate may have. */
export const RATE_MAX_DECIMALS = 6;

/** Reads a rate in US$ per troy ounce of fine metal: above zero. Throws MeasureError of `parseDecimal`. */
export function parseRate(text: string, field: string): Dec {
  return parseDecimal(text, { field, maxDecimals: RATE_MAX_DECIMALS, above: '0', max: RATE_MAX });
}

/**
 * The one quote of a metal in a list, with its rate read. `pointer` makes the JSON pointer of the quote at an index.
 * Throws MeasureError `quote-missing`, `quote-repeated` and those of `parseRate`.
 */
export function quoteOf(quotes: readonly QuoteRef[], metal: Metal): { quote: QuoteRef; rate: Dec } {
  const index = quotes.findIndex((quote) => quote.metal === metal);
  const quote = quotes[index];
  if (!quote) {
    throw new MeasureError(
      'quote-missing',
      '/quotes',
      `There is no quote for ${METAL_NAMES[metal].toLowerCase()}.`,
    );
  }
  return { quote, rate: parseRate(quote.usdPerTroyOunce, `/quotes/${index}/usdPerTroyOunce`) };
}

/** Refuses a list that names an unknown metal or one metal twice. Throws `metal-unknown`, `quote-repeated`. */
export function assertQuotesDistinct(quotes: readonly QuoteRef[]): void {
  quotes.forEach((quote, index) => {
    const symbol: string = quote.metal;
    if (!isMetal(symbol)) {
      throw new MeasureError('metal-unknown', `/quotes/${index}/metal`, 'Quotes are for Au, Ag, Pt and Pd.');
    }
    if (quotes.findIndex((other) => other.metal === symbol) !== index) {
      throw new MeasureError('quote-repeated', `/quotes/${index}`, `${METAL_NAMES[symbol]} has two quotes.`);
    }
  });
}
