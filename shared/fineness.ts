import { dec, parseDecimal, type Dec } from './decimal.ts';
import { MeasureError } from './domain-error.ts';

/** Ways to enter a mass fraction: parts per thousand, karat (n/24), percent, grams per tonne. */
export const FINENESS_UNITS = ['permille', 'karat', 'percent', 'gpt'] as const;

/** The wire key of a fineness unit. */
export type FinenessUnit = (typeof FINENESS_UNITS)[number];

/** A fineness, or an uncertainty of one, as entered. */
export type FinenessEntry = { readonly value: string; readonly unit: FinenessUnit };

/** How a fineness unit is written. */
export const FINENESS_UNIT_LABELS: Readonly<Record<FinenessUnit, string>> = {
  permille: '‰',
  karat: 'karat',
  percent: '%',
  gpt: 'g/t',
};

/** What is whole (pure metal) in each unit: 1000 ‰, 24 karat, 100 %, 1 000 000 g/t. */
export const WHOLE_OF_UNIT: Readonly<Record<FinenessUnit, string>> = {
  permille: '1000',
  karat: '24',
  percent: '100',
  gpt: '1000000',
};

/** Digits after the dot that a fineness may be entered with. */
export const FINENESS_MAX_DECIMALS = 6;

/** A mass fraction kept as numerator over denominator, so that 14 karat stays 14/24 exactly. */
export type MassFraction = { readonly numerator: Dec; readonly denominator: Dec };

/** True for a known fineness unit key. */
export function isFinenessUnit(unit: unknown): unit is FinenessUnit {
  return (FINENESS_UNITS as readonly unknown[]).includes(unit);
}

/**
 * Reads a fineness above zero and at most the whole (1000 ‰, 24 karat, 100 %, 1 000 000 g/t), exactly.
 * Throws MeasureError `unit-missing`, `unit-unknown`, `fineness-too-high`, `fineness-too-low` and those of `parseDecimal`.
 */
export function toFraction(entry: FinenessEntry, field = ''): MassFraction {
  const unit: unknown = entry.unit;
  if (unit === undefined || unit === null || unit === '') {
    throw new MeasureError('unit-missing', `${field}/unit`, 'Say in which unit the fineness is.');
  }
  if (!isFinenessUnit(unit)) {
    throw new MeasureError(
      'unit-unknown',
      `${field}/unit`,
      `Use one of the units ${FINENESS_UNITS.join(', ')}.`,
    );
  }
  const value = parseDecimal(entry.value, { field: `${field}/value`, maxDecimals: FINENESS_MAX_DECIMALS });
  if (value.lte(0)) {
    throw new MeasureError('fineness-too-low', `${field}/value`, 'This value must be above zero.');
  }
  const whole = WHOLE_OF_UNIT[unit];
  if (value.gt(whole)) {
    const label = FINENESS_UNIT_LABELS[unit];
    throw new MeasureError('fineness-too-high', `${field}/value`, `Pure metal is ${whole} ${label}.`);
  }
  return { numerator: value, denominator: dec(whole) };
}

/** A fineness in parts per thousand, to 60 digits (karat may not end). Same bounds and errors as `toFraction`. */
export function toPermille(entry: FinenessEntry, field = ''): Dec {
  return fractionToPermille(toFraction(entry, field));
}

/** Parts per thousand of a mass fraction. */
export function fractionToPermille(fraction: MassFraction): Dec {
  return fraction.numerator.times(1000).div(fraction.denominator);
}

/** The value of a fraction as a decimal (0.585), to 60 digits. */
export function fractionValue(fraction: MassFraction): Dec {
  return fraction.numerator.div(fraction.denominator);
}

/** Parts per thousand shown in another unit, to 60 digits. */
export function fromPermille(permille: Dec, unit: FinenessUnit): Dec {
  return permille.times(WHOLE_OF_UNIT[unit]).div(1000);
}

/** A fineness in words as printed: '916.7 ‰', '14 karat'. */
export function finenessText(entry: FinenessEntry): string {
  return `${entry.value} ${FINENESS_UNIT_LABELS[entry.unit]}`;
}

/** The smallest number that every whole divides, so that fractions of any units add up exactly. */
const COMMON_DENOMINATOR = dec('3000000');

/** Exact total of several fractions in parts per thousand; 14 karat and 10 karat make 1000 exactly. */
export function totalPermille(fractions: readonly MassFraction[]): Dec {
  const total = fractions.reduce(
    (sum, { numerator, denominator }) => sum.plus(numerator.times(COMMON_DENOMINATOR.div(denominator))),
    dec('0'),
  );
  return total.times(1000).div(COMMON_DENOMINATOR);
}

/** Refuses fractions that make more than the whole. Throws MeasureError `fractions-over-whole` at `field`. */
export function assertTotalWithinWhole(fractions: readonly MassFraction[], field: string): void {
  if (totalPermille(fractions).gt(1000)) {
    throw new MeasureError('fractions-over-whole', field, 'Together the fractions make more than 1000 ‰.');
  }
}

/** The highest standard that a fineness reaches, or null when it reaches none. A mark never exceeds what is there. */
export function roundDownToStandard(permille: Dec, standards: readonly string[]): string | null {
  let best: string | null = null;
  for (const standard of standards) {
    if (permille.gte(standard) && (best === null || dec(standard).gt(best))) best = standard;
  }
  return best;
}
