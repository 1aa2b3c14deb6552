import { apportion } from './apportion.ts';
import { Dec, dec, fixed, parseDecimal, type DecInput } from './decimal.ts';
import { MeasureError } from './domain-error.ts';

/** ISO 4217 codes in use. There is one for now; a second is refused wherever money is made. */
export type Currency = 'USD';

/** Digits after the dot of each currency (ISO 4217). */
export const MINOR_DIGITS: Readonly<Record<Currency, number>> = { USD: 2 };

/** The largest amount in minor units that is taken from outside: US$ 999,999,999.99. */
export const AMOUNT_MAX_MINOR = 99_999_999_999n;

/** An exact sum: a whole count of minor units with its currency. */
export type Money = { readonly currency: Currency; readonly minor: bigint };

/** Makes money from a currency code that came from outside. Throws MeasureError `currency-not-supported`. */
export function money(currency: string, minor: bigint): Money {
  if (currency !== 'USD') {
    throw new MeasureError('currency-not-supported', '/currency', 'Sums are in US dollars (USD) only.');
  }
  return { currency, minor };
}

/** US dollars from a count of cents. */
export function usd(minor: bigint): Money {
  return { currency: 'USD', minor };
}

/** No money. */
export const ZERO: Money = usd(0n);

function sameCurrency(left: Money, right: Money): Currency {
  if (left.currency !== right.currency) {
    throw new MeasureError('currency-mismatch', '/currency', 'Two currencies cannot be combined.');
  }
  return money(left.currency, 0n).currency;
}

/** Sum of any number of amounts in one currency; the sum of none is zero US dollars. Throws `currency-mismatch`. */
export function add(...amounts: readonly Money[]): Money {
  return amounts.reduce(
    (sum, next) => ({ currency: sameCurrency(sum, next), minor: sum.minor + next.minor }),
    ZERO,
  );
}

/** Left minus right, in one currency. Throws `currency-mismatch`. */
export function subtract(left: Money, right: Money): Money {
  return { currency: sameCurrency(left, right), minor: left.minor - right.minor };
}

/** The same sum with the other sign. */
export function negate(amount: Money): Money {
  return { currency: amount.currency, minor: -amount.minor };
}

/** -1, 0 or 1. Throws `currency-mismatch`. */
export function compare(left: Money, right: Money): -1 | 0 | 1 {
  sameCurrency(left, right);
  return left.minor < right.minor ? -1 : left.minor > right.minor ? 1 : 0;
}

/** True when there is no money. */
export function isZero(amount: Money): boolean {
  return amount.minor === 0n;
}

/** Splits a sum by weights; the shares add up to it to the cent (see `apportion`). Throws `weights-not-usable`. */
export function allocate(amount: Money, weights: readonly DecInput[]): Money[] {
  return apportion(amount.minor, weights.map(dec)).map((minor) => ({ currency: amount.currency, minor }));
}

/** Rounds an amount in whole currency units once, half away from zero, to minor units. */
export function roundToMinor(amount: Dec): bigint {
  return BigInt(amount.times(100).toDecimalPlaces(0, Dec.ROUND_HALF_UP).toFixed(0));
}

/** A percentage of a sum, rounded once, half away from zero. `percent` is a plain decimal: '1.5' means 1.5 %. */
export function percentOf(amount: Money, percent: string): Money {
  const share = dec(amount.minor)
    .times(parseDecimal(percent, { field: '/percent' }))
    .div(100);
  return {
    currency: amount.currency,
    minor: BigInt(share.toDecimalPlaces(0, Dec.ROUND_HALF_UP).toFixed(0)),
  };
}

/** Plain decimal text with two digits after the dot: '727.38', '-2.00'. */
export function toAmount(amount: Money): string {
  return minorToAmount(amount.minor);
}

/** The amount text of a count of cents: 72738n gives '727.38'. */
export function minorToAmount(minor: bigint): string {
  return fixed(dec(minor).div(100), 2);
}

/** A plain decimal text with its whole part in groups of three: '1234567.89' gives '1,234,567.89'. For sentences. */
export function groupThousands(number: string): string {
  const [whole = '', decimals] = number.split('.');
  const head = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return decimals === undefined ? head : `${head}.${decimals}`;
}

/**
 * Reads an amount in US dollars: a plain decimal with at most two digits after the dot.
 * Throws MeasureError of `parseDecimal`, or `too-large` beyond `AMOUNT_MAX_MINOR` either way.
 */
export function fromAmount(text: string, field = ''): Money {
  const limit = dec(AMOUNT_MAX_MINOR).div(100);
  const value = parseDecimal(text, { field, maxDecimals: 2, min: limit.negated(), max: limit });
  return usd(roundToMinor(value));
}
