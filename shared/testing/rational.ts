/**
 * Exact fractions on native BigInt: an oracle for the engine that shares no code with it and no decimal library. For
 * tests only: nothing that runs imports this folder.
 */
export type Rational = { readonly over: bigint; readonly under: bigint };

/** A fraction from two whole numbers. */
export function ratio(over: bigint, under: bigint): Rational {
  if (under === 0n) throw new Error('Division by zero');
  return under < 0n ? { over: -over, under: -under } : { over, under };
}

/** A fraction from plain decimal text. */
export function rational(text: string): Rational {
  const match = /^(-?)(\d+)(?:\.(\d+))?$/.exec(text);
  if (!match) throw new Error(`Not a plain decimal: ${text}`);
  const [, sign, whole = '0', decimals = ''] = match;
  const digits = BigInt(whole + decimals);
  return { over: sign === '-' ? -digits : digits, under: 10n ** BigInt(decimals.length) };
}

export function plus(left: Rational, right: Rational): Rational {
  return ratio(left.over * right.under + right.over * left.under, left.under * right.under);
}

export function times(...factors: readonly Rational[]): Rational {
  return factors.reduce((product, next) => ratio(product.over * next.over, product.under * next.under));
}

export function over(left: Rational, right: Rational): Rational {
  return ratio(left.over * right.under, left.under * right.over);
}

export function isAtMost(left: Rational, right: Rational): boolean {
  return left.over * right.under <= right.over * left.under;
}

/** The nearest whole number, half away from zero. */
export function nearest({ over: top, under }: Rational): bigint {
  const size = top < 0n ? -top : top;
  const rounded = (2n * size + under) / (2n * under);
  return top < 0n ? -rounded : rounded;
}

/** Plain decimal text with `places` digits, half away from zero. */
export function toPlaces(value: Rational, places: number): string {
  const units = nearest(times(value, ratio(10n ** BigInt(places), 1n)));
  const digits = (units < 0n ? -units : units).toString().padStart(places + 1, '0');
  const text = places === 0 ? digits : `${digits.slice(0, -places)}.${digits.slice(-places)}`;
  return units < 0n ? `-${text}` : text;
}
