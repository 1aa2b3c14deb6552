import { dec, decimalsTyped, fixed, lastDigitOf, plain } from '#shared/decimal.ts';
import { fromGrams, GRAMS_PER_UNIT, type MassEntry } from '#shared/mass.ts';
import type { ReadingUnit } from '#shared/mass-in-units.ts';
import { fromAmount, minorToAmount } from '#shared/money.ts';
import type { LotAnswer } from '#shared/schemas/lots.ts';

/** A fineness for reading: karat thirds go on for ever, three digits after the dot are more than any assay tells. */
export function shownPermille(permille: string): string {
  return plain(dec(fixed(dec(permille), 3)));
}

const FINE_PLACES_MAX = 6;

/**
 * A fine content for reading, in the reader's unit: with the digits of the gross mass in its own unit, in another with as
 * many as tell no more than the balance did.
 */
export function shownFine(fineGrams: string, gross: MassEntry, unit: ReadingUnit): string {
  const step = lastDigitOf(gross.value).times(GRAMS_PER_UNIT[gross.unit]).div(GRAMS_PER_UNIT[unit]);
  const digits = gross.unit === unit ? decimalsTyped(gross.value) : -step.log(10).floor().toNumber();
  const places = Math.min(FINE_PLACES_MAX, Math.max(0, digits));
  return fixed(fromGrams(dec(fineGrams), unit), places);
}

/** US$ per troy ounce told per unit of the reader, by the exact factors; the troy ounce's own figure stays as it came. */
export function pricePerUnit(usdPerTroyOunce: string, unit: ReadingUnit): string {
  if (unit === 'ozt') return usdPerTroyOunce;
  return fixed(dec(usdPerTroyOunce).times(GRAMS_PER_UNIT[unit]).div(GRAMS_PER_UNIT.ozt), 4);
}

/** What a buyer pays: price and parcel. Null where a lot carries no price. */
export function totalOf(lot: Pick<LotAnswer, 'price' | 'shipping'>): string | null {
  if (lot.price === null) return null;
  return minorToAmount(fromAmount(lot.price.amount).minor + fromAmount(lot.shipping?.amount ?? '0.00').minor);
}

/** The ends of the range in % of the melt value itself. */
export function bandOf(melt: { value: string; low: string; high: string }) {
  const value = dec(melt.value);
  if (!value.gt(0)) return null;
  const percent = (end: string) => fixed(dec(end).times(100).div(value), 2);
  return { low: percent(melt.low), high: percent(melt.high) };
}
