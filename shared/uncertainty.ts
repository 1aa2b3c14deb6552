import { apportion } from './apportion.ts';
import { dec, fixed, type Dec } from './decimal.ts';

/** Coverage factor of every expanded uncertainty: about 95 % for a normal distribution (GUM, JCGM 100:2008, 6.2). */
export const COVERAGE_FACTOR: Dec = dec('2');

/** Accuracy classes of balances (OIML R 76-1) that can be given with a readability. */
export const BALANCE_CLASSES = ['I', 'II', 'III'] as const;

/** An accuracy class of a balance. */
export type BalanceClass = (typeof BALANCE_CLASSES)[number];

/**
 * Loads, in scale intervals e, up to which the error limit at first verification is 0.5 e and 1 e; above it is 1.5 e.
 * OIML R 76-1 Table 6, read second-hand.
 */
const CLASS_STEPS: Readonly<Record<BalanceClass, { readonly half: string; readonly one: string }>> = {
  I: { half: '50000', one: '200000' },
  II: { half: '5000', one: '20000' },
  III: { half: '500', one: '2000' },
};

/** Standard uncertainty of a display that shows steps of d: a rectangle of width d, so d/√12 (GUM 4.3.7, F.2.2.1). */
export function readabilityUncertainty(readability: Dec): Dec {
  return readability.div(dec('12').sqrt());
}

/**
 * Error limit of a balance in service: twice the limit at first verification (OIML R 76-1). `interval` is e, taken as
 * the readability; load and answer are in the unit of `interval`.
 */
export function classLimitInService(balanceClass: BalanceClass, interval: Dec, load: Dec): Dec {
  const { half, one } = CLASS_STEPS[balanceClass];
  const loadInIntervals = load.div(interval);
  if (loadInIntervals.lte(half)) return interval;
  return loadInIntervals.lte(one) ? interval.times(2) : interval.times(3);
}

/**
 * Standard uncertainty of a mass: readability as a rectangle, or class limit/√3 when a class is given and that is larger.
 * All in the same unit.
 */
export function massUncertainty(load: Dec, readability: Dec, balanceClass: BalanceClass | null): Dec {
  const byReadability = readabilityUncertainty(readability);
  if (balanceClass === null) return byReadability;
  const byClass = classLimitInService(balanceClass, readability, load).div(dec('3').sqrt());
  return byClass.gt(byReadability) ? byClass : byReadability;
}

/** Root of the sum of squares. */
export function rss(parts: readonly Dec[]): Dec {
  return parts.reduce((sum, part) => sum.plus(part.times(part)), dec('0')).sqrt();
}

/** One independent input: its name, how the result moves with it (∂y/∂x), and its standard uncertainty. */
export type UncertainInput<Name extends string> = {
  readonly input: Name;
  readonly sensitivity: Dec;
  readonly standard: Dec;
};

/** Result of the law of propagation: standard and expanded uncertainty, and each input's share of the variance. */
export type CombinedUncertainty<Name extends string> = {
  readonly standard: Dec;
  readonly expanded: Dec;
  readonly shares: { input: Name; percent: string }[];
};

/** Law of propagation for independent inputs (GUM 5.1.2). The shares add up to exactly 100.0 %, or are all 0.0. */
export function combine<Name extends string>(
  inputs: readonly UncertainInput<Name>[],
): CombinedUncertainty<Name> {
  const parts = inputs.map(({ sensitivity, standard }) => sensitivity.times(standard));
  const standard = rss(parts);
  const variances = parts.map((part) => part.times(part));
  const tenths = standard.isZero() ? inputs.map(() => 0n) : apportion(1000n, variances);
  return {
    standard,
    expanded: standard.times(COVERAGE_FACTOR),
    shares: inputs.map(({ input }, index) => ({
      input,
      percent: fixed(dec(tenths[index] ?? 0n).div(10), 1),
    })),
  };
}
