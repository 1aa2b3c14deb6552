import type { AssayMethodKey } from '../assay/methods.ts';
import { fixed } from '../decimal.ts';
import type { FinenessEntry } from '../fineness.ts';
import type { MassEntry } from '../mass.ts';
import { isMetal, type Metal } from '../metals.ts';
import { MeasureError } from '../domain-error.ts';
import { minorToAmount } from '../money.ts';
import { measureLot } from './lot-measures.ts';
import { computeMelt } from './melt.ts';
import type { AssumedValue, QuoteRef } from './sheet-types.ts';

/** One metal of a valuation request. Every metal given is valued. */
export type ValuationContent = {
  metal: Metal;
  fineness: FinenessEntry;
  uncertainty?: FinenessEntry | null | undefined;
  method?: AssayMethodKey | undefined;
};

/** A request to value any mass and assay; quotes in US$ per troy ounce of fine metal. */
export type ValuationRequest = {
  mass: MassEntry;
  readability?: MassEntry | null | undefined;
  contents: ValuationContent[];
  quotes?: Partial<Record<Metal, string>> | undefined;
};

/** The answer: each metal, the total with its band (k = 2), and what was assumed. All numbers are strings. */
export type ValuationAnswer = {
  metals: {
    metal: Metal;
    fineGrams: string;
    fineTroyOunces: string;
    value: string;
    quote: { usdPerTroyOunce: string; at: string | null; source: string };
  }[];
  total: { currency: 'USD'; value: string; low: string; high: string };
  assumed: AssumedValue[];
};

/**
 * Values a mass and an assay at the quotes given in the request, or else at `currentQuotes`; the same rounding and band
 * as a sheet (see `computeMelt`). Fine grams are shown to six decimals.
 * Throws MeasureError with every issue: the codes of `measureLot` at `/mass`, `/readability`, `/contents/…` and those
 * of `computeMelt` at `/quotes/…`; `quote-missing` when a metal has neither a given nor a current quote.
 */
export function valuate(request: ValuationRequest, currentQuotes: readonly QuoteRef[] = []): ValuationAnswer {
  const measures = measureLot(
    {
      gross: request.mass,
      readability: request.readability ?? null,
      contents: request.contents.map((content) => ({
        metal: content.metal,
        fineness: content.fineness,
        uncertainty: content.uncertainty ?? null,
        method: content.method ?? 'none',
        paidFor: true,
      })),
    },
    '/mass',
  );
  const quotes = quotesFor(request.quotes ?? {}, currentQuotes);
  const melt = withQuotePointers(quotes, () => computeMelt(measures, quotes));
  return {
    metals: melt.metals.map(({ metal, grams, troyOuncesText, amountMinor, quote }) => ({
      metal,
      fineGrams: fixed(grams, 6),
      fineTroyOunces: troyOuncesText,
      value: minorToAmount(amountMinor),
      quote: { usdPerTroyOunce: quote.usdPerTroyOunce, at: quote.at, source: quote.source },
    })),
    total: {
      currency: 'USD',
      value: melt.figure.value,
      low: melt.figure.low,
      high: melt.figure.high,
    },
    assumed: measures.assumed,
  };
}

function quotesFor(given: Partial<Record<Metal, string>>, current: readonly QuoteRef[]): QuoteRef[] {
  const fromRequest = Object.entries(given).flatMap(([metal, usdPerTroyOunce]): QuoteRef[] => {
    if (!isMetal(metal)) {
      throw new MeasureError('metal-unknown', `/quotes/${metal}`, 'Quotes are for Au, Ag, Pt and Pd.');
    }
    return usdPerTroyOunce === undefined
      ? []
      : [{ id: null, metal, usdPerTroyOunce, at: null, source: 'given' }];
  });
  return [...fromRequest, ...current.filter((quote) => given[quote.metal] === undefined)];
}

/** A request names its quotes by metal, not by index: `/quotes/0/usdPerTroyOunce` becomes `/quotes/Au`. */
function withQuotePointers<T>(quotes: readonly QuoteRef[], step: () => T): T {
  try {
    return step();
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    const issues = error.issues.map((issue) => ({
      ...issue,
      field: issue.field.replace(/^\/quotes\/(\d+)\/usdPerTroyOunce$/, (whole, index: string) => {
        const metal = quotes.find((_, position) => String(position) === index)?.metal;
        return metal ? `/quotes/${metal}` : whole;
      }),
    }));
    throw new MeasureError(error.code, issues[0]?.field ?? error.field, error.message, issues);
  }
}
