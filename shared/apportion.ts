import { dec, type Dec } from './decimal.ts';
import { MeasureError } from './domain-error.ts';

/**
 * Splits a whole number by weights so that the shares add up to it exactly. Each share is cut towards zero; what is left
 * goes one unit at a time to the largest remainders, the earlier of equals first. Weights are zero or more, not all zero.
 * Throws MeasureError `weights-not-usable`.
 */
export function apportion(whole: bigint, weights: readonly Dec[]): bigint[] {
  const total = weights.reduce((sum, weight) => sum.plus(weight), dec(0n));
  if (weights.some((weight) => !weight.isFinite() || weight.lt(0)) || !total.gt(0)) {
    throw new MeasureError('weights-not-usable', '', 'Weights must be zero or more, and not all zero.');
  }
  const sign = whole < 0n ? -1n : 1n;
  const size = whole * sign;
  const exact = weights.map((weight) => dec(size).times(weight).div(total));
  const shares = exact.map((share) => BigInt(share.floor().toFixed(0)));
  const byRemainder = exact
    .map((share, index) => ({ index, remainder: share.minus(share.floor()) }))
    .sort((left, right) => right.remainder.cmp(left.remainder) || left.index - right.index);
  let left = size - shares.reduce((sum, share) => sum + share, 0n);
  for (const { index } of byRemainder) {
    if (left <= 0n) break;
    shares[index] = (shares[index] ?? 0n) + 1n;
    left -= 1n;
  }
  return shares.map((share) => share * sign);
}
