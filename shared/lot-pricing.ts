import { dec, fixed, parseDecimal, plain } from './decimal.ts';
import { IssueCollector, MeasureError } from './domain-error.ts';
import {
  FLOOR_PERCENT_MAX,
  FLOOR_PERCENT_MIN,
  LINKED_PERCENT_MAX,
  LINKED_PERCENT_MIN,
  PRICE_MINOR_MAX,
  PRICE_MINOR_MIN,
} from './limits.ts';
import { fromAmount, groupThousands, minorToAmount } from './money.ts';
import { typedDecimal } from './typed-number.ts';

/** Pricing bases that a draft can choose: a fixed sum, or a share of melt made a sum by a price fix. */
export const DRAFT_PRICINGS = ['outright', 'linked'] as const;

/** A pricing basis of a draft. */
export type DraftPricing = (typeof DRAFT_PRICINGS)[number];

/** A lot's price as read from its draft: exactly one of sum and percentage, and a floor only beside a sum. */
export type ParsedPricing =
  | { pricingBasis: 'outright'; priceMinor: bigint; linkedPercent: null; floorPercent: string | null }
  | { pricingBasis: 'linked'; priceMinor: null; linkedPercent: string; floorPercent: null };

/** The fields of a draft that say how it is priced, as typed. */
export type TypedPricing = { pricing: string; price: string; linkedPercent: string; floorPercent: string };

/** The basis that a draft has chosen; blank is outright. Throws MeasureError `pricing-unknown` at `/pricing`. */
export function readPricingBasis(text: string): DraftPricing {
  if (text === '') return 'outright';
  const found = DRAFT_PRICINGS.find((known) => known === text);
  if (found) return found;
  throw new MeasureError('pricing-unknown', '/pricing', 'Choose a fixed sum or a share of melt.');
}

/** Reads a price in US dollars as typed, in cents. Throws MeasureError at `/price`. */
export function readPrice(text: string): bigint {
  const { minor } = fromAmount(typedDecimal(text, '/price', 'Enter a price.'), '/price');
  checkPrice(minor);
  return minor;
}

/** Refuses a price outside the limits of the house. Throws MeasureError `price-too-low`, `price-too-high` at `/price`. */
export function checkPrice(minor: bigint): void {
  if (minor < PRICE_MINOR_MIN) {
    throw new MeasureError(
      'price-too-low',
      '/price',
      `The lowest price is US$ ${groupThousands(minorToAmount(PRICE_MINOR_MIN))}.`,
    );
  }
  if (minor > PRICE_MINOR_MAX) {
    throw new MeasureError(
      'price-too-high',
      '/price',
      `The highest price is US$ ${groupThousands(minorToAmount(PRICE_MINOR_MAX))}: more than that a card cannot pay.`,
    );
  }
}

/**
 * A share of melt of a linked lot as typed, in plain notation: at most two digits after the dot, within the limits of the
 * house. Throws MeasureError of `parseDecimal` and `number-missing` at `/linkedPercent`.
 */
export function readLinkedPercent(text: string): string {
  const field = '/linkedPercent';
  const typed = typedDecimal(text, field, 'Enter the share of melt in %.');
  const bounds = { field, maxDecimals: 2, min: LINKED_PERCENT_MIN, max: LINKED_PERCENT_MAX };
  return plain(parseDecimal(typed, bounds));
}

/** The floor of an outright price in % of melt as typed; null where none is set. Throws MeasureError at `/floorPercent`. */
export function readFloorPercent(text: string): string | null {
  if (text.trim() === '') return null;
  const field = '/floorPercent';
  const bounds = { field, maxDecimals: 2, min: FLOOR_PERCENT_MIN, max: FLOOR_PERCENT_MAX };
  return plain(parseDecimal(typedDecimal(text, field, 'Enter the floor in % of melt.'), bounds));
}

/** Reads how a draft is priced, by its basis; what was typed for the other basis is left alone. Throws MeasureError. */
export function readPricing(typed: TypedPricing): ParsedPricing {
  if (readPricingBasis(typed.pricing) === 'linked') {
    const linkedPercent = readLinkedPercent(typed.linkedPercent);
    return { pricingBasis: 'linked', priceMinor: null, linkedPercent, floorPercent: null };
  }
  const issues = new IssueCollector();
  const priceMinor = issues.attempt(() => readPrice(typed.price));
  const floor = issues.attempt(() => ({ percent: readFloorPercent(typed.floorPercent) }));
  issues.finish();
  return {
    pricingBasis: 'outright',
    priceMinor: priceMinor ?? 0n,
    linkedPercent: null,
    floorPercent: floor?.percent ?? null,
  };
}

/** A stored percentage as it is read by people: two digits after the dot, `98.2000` gives `98.20`. */
export function percentText(percent: string): string {
  return fixed(dec(percent), 2);
}
