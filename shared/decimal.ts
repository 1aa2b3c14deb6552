import { Decimal } from 'decimal.js';
import { MeasureError } from './domain-error.ts';

/**
 * The one private clone of Decimal: 60 significant digits, half away from zero (ROUND_HALF_UP), plain notation only.
 * Nothing else in the project configures or imports decimal.js.
 */
export const Dec = Decimal.clone({
  precision: 60,
  rounding: Decimal.ROUND_HALF_UP,
  toExpNeg: -9e15,
  toExpPos: 9e15,
});

/** A decimal number of the private clone. */
export type Dec = Decimal;

/** What can be made into a decimal without loss. JavaScript numbers are left out on purpose. */
export type DecInput = string | bigint | Dec;

/** Makes a decimal from a trusted string, bigint or decimal; use `parseDecimal` for text from outside. */
export function dec(value: DecInput): Dec {
  return new Dec(typeof value === 'bigint' ? value.toString() : value);
}

/** Bounds for `parseDecimal`; `min` and `max` are inclusive, `above` and `below` exclusive. */
export type DecimalBounds = {
  readonly field?: string;
  readonly maxDecimals?: number;
  readonly min?: DecInput;
  readonly max?: DecInput;
  readonly above?: DecInput;
  readonly below?: DecInput;
};

const PLAIN_DECIMAL = /^-?(?:0|[1-9]\d*)(?:\.\d+)?$/;
const TEXT_LENGTH_MAX = 40;

/**
 * Reads a plain decimal: digits, one dot at most, an optional minus; no plus, exponent, comma, blanks or leading zeros.
 * Throws MeasureError `not-a-decimal`, `decimal-comma`, `number-too-long`, `too-many-decimals`, `too-small`, `too-large`.
 */
export function parseDecimal(text: string, bounds: DecimalBounds = {}): Dec {
  const field = bounds.field ?? '';
  if (typeof text !== 'string') {
    throw new MeasureError('not-a-decimal', field, 'Write the number as text, such as "12.34".');
  }
  if (text.length > TEXT_LENGTH_MAX) {
    throw new MeasureError('number-too-long', field, `A number has at most ${TEXT_LENGTH_MAX} characters.`);
  }
  if (!PLAIN_DECIMAL.test(text)) {
    if (/^-?\d+(?:[ .]\d{3})*,\d+$/.test(text)) {
      throw new MeasureError('decimal-comma', field, 'Use a dot as the decimal sign: 12.34, not 12,34.');
    }
    throw new MeasureError('not-a-decimal', field, 'Write a plain number, such as 12.34.');
  }
  const maxDecimals = bounds.maxDecimals;
  if (maxDecimals !== undefined && decimalsTyped(text) > maxDecimals) {
    throw new MeasureError('too-many-decimals', field, `Use at most ${maxDecimals} digits after the dot.`);
  }
  const value = new Dec(text);
  checkBounds(value, bounds, field);
  return value;
}

function checkBounds(value: Dec, bounds: DecimalBounds, field: string): void {
  const { min, above, max, below } = bounds;
  if (above !== undefined && value.lte(dec(above))) {
    throw new MeasureError('too-small', field, `The number must be above ${plain(dec(above))}.`);
  }
  if (min !== undefined && value.lt(dec(min))) {
    throw new MeasureError('too-small', field, `The number must be at least ${plain(dec(min))}.`);
  }
  if (max !== undefined && value.gt(dec(max))) {
    throw new MeasureError('too-large', field, `The number must be at most ${plain(dec(max))}.`);
  }
  if (below !== undefined && value.gte(dec(below))) {
    throw new MeasureError('too-large', field, `The number must be below ${plain(dec(below))}.`);
  }
}

/** How many digits stand after the dot of a plain decimal as typed: '12.50' has two. */
export function decimalsTyped(text: string): number {
  const dot = text.indexOf('.');
  return dot === -1 ? 0 : text.length - dot - 1;
}

/** One unit of the last digit typed: '12.34' gives 0.01, '12' gives 1. */
export function lastDigitOf(text: string): Dec {
  return new Dec(10).pow(-decimalsTyped(text));
}

/** Plain notation without trailing zeros and without an exponent; zero is never negative. */
export function plain(value: Dec): string {
  return value.isZero() ? '0' : value.toFixed();
}

/** Rounds half away from zero to exactly `places` digits after the dot; zero is never negative. */
export function fixed(value: Dec, places: number): string {
  const rounded = value.toDecimalPlaces(places, Decimal.ROUND_HALF_UP);
  return (rounded.isZero() ? rounded.abs() : rounded).toFixed(places);
}

/** Cuts towards zero to exactly `places` digits after the dot; for showing where a number goes on, never for computing. */
export function cut(value: Dec, places: number): string {
  return value.toDecimalPlaces(places, Decimal.ROUND_DOWN).toFixed(places);
}

/** How `roundToStep` rounds: half away from zero, or towards zero. */
export type StepRounding = 'half-away' | 'towards-zero';

/** Rounds to a whole multiple of `step` (above zero). */
export function roundToStep(value: Dec, step: Dec, rounding: StepRounding = 'half-away'): Dec {
  if (!step.gt(0)) throw new MeasureError('step-not-positive', '', 'A rounding step must be above zero.');
  const mode = rounding === 'half-away' ? Decimal.ROUND_HALF_UP : Decimal.ROUND_DOWN;
  return value.div(step).toDecimalPlaces(0, mode).times(step);
}

/** Compares two plain decimals given as strings: -1, 0 or 1. */
export function compareDecimals(left: string, right: string): -1 | 0 | 1 {
  const order = new Dec(left).cmp(right);
  return order < 0 ? -1 : order > 0 ? 1 : 0;
}
