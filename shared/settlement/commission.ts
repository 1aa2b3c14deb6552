import { dec, parseDecimal } from '../decimal.ts';
import { MeasureError } from '../domain-error.ts';
import { percentOf, usd } from '../money.ts';

/** Rate of a payment method in % and the least commission in cents. */
export type CommissionRate = { readonly percent: string; readonly minimumMinor: bigint };

/** How a commission came about: by the percentage, lifted to the minimum, or held to the price. */
export type CommissionRule = 'percent' | 'minimum' | 'price';

/**
 * Commission on the price of the metal without shipping, in cents: the percentage rounded once, half away from zero, at
 * least the minimum, never above the price. Throws MeasureError `price-negative`, `minimum-negative` and those of
 * `parseDecimal` for a percentage outside 0 to 100.
 */
export function commissionFor(priceMinor: bigint, rate: CommissionRate): bigint {
  return explainCommission(priceMinor, rate).minor;
}

/** The same as `commissionFor`, with the rule that decided and what the percentage alone comes to. */
export function explainCommission(
  priceMinor: bigint,
  { percent, minimumMinor }: CommissionRate,
): { minor: bigint; byPercentMinor: bigint; rule: CommissionRule } {
  if (priceMinor < 0n) throw new MeasureError('price-negative', '/price', 'A price is never below zero.');
  if (minimumMinor < 0n) {
    throw new MeasureError('minimum-negative', '/commission/minimum', 'A minimum is never below zero.');
  }
  parseDecimal(percent, { field: '/commission/percent', min: '0', max: dec('100') });
  const byPercentMinor = percentOf(usd(priceMinor), percent).minor;
  const wanted = byPercentMinor < minimumMinor ? minimumMinor : byPercentMinor;
  if (wanted > priceMinor) return { minor: priceMinor, byPercentMinor, rule: 'price' };
  return { minor: wanted, byPercentMinor, rule: byPercentMinor < minimumMinor ? 'minimum' : 'percent' };
}
