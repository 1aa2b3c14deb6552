import {
  isAtMost,
  nearest,
  over,
  plus,
  ratio,
  rational,
  times,
  toPlaces,
  type Rational,
} from './rational.ts';

/** One metal as the oracle takes it: fraction as whole numbers, expanded uncertainty as a fraction of one, rate. */
export type OracleMetal = { fraction: Rational; expanded: Rational; rate: string };

const GRAMS_PER_OUNCE = rational('31.1034768');

/** Cents of one metal line: fine ounces rounded to a millionth, × rate, rounded to the cent. */
export function oracleLine(
  grams: string,
  { fraction, rate }: OracleMetal,
): { ounces: string; cents: bigint } {
  const ounces = toPlaces(over(times(rational(grams), fraction), GRAMS_PER_OUNCE), 6);
  return { ounces, cents: nearest(times(rational(ounces), rational(rate), ratio(100n, 1n))) };
}

/**
 * True when `expandedCents` is the rounded 2·u of the melt value: (E − ½)² ≤ 4u² ≤ (E + ½)², all in exact fractions.
 * The variance of a display of step d is d²/12, so that no root is needed.
 */
export function isExpandedRight(
  expandedCents: bigint,
  grams: string,
  step: string,
  metals: readonly OracleMetal[],
): boolean {
  const centsPerGram = ({ rate }: OracleMetal) =>
    over(times(rational(rate), ratio(100n, 1n)), GRAMS_PER_OUNCE);
  const perGramOfLot = metals.reduce(
    (sum, metal) => plus(sum, times(metal.fraction, centsPerGram(metal))),
    ratio(0n, 1n),
  );
  const massVariance = times(perGramOfLot, perGramOfLot, rational(step), rational(step), ratio(1n, 12n));
  const variance = metals.reduce((sum, metal) => {
    const part = times(rational(grams), centsPerGram(metal), metal.expanded, ratio(1n, 2n));
    return plus(sum, times(part, part));
  }, massVariance);
  const fourfold = times(variance, ratio(4n, 1n));
  const edge = (halves: bigint) => ratio(halves * halves, 4n);
  const lower = 2n * expandedCents - 1n;
  return (
    (lower <= 0n || isAtMost(edge(lower), fourfold)) && isAtMost(fourfold, edge(2n * expandedCents + 1n))
  );
}
