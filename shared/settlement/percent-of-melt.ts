import { dec, fixed, parseDecimal, type DecInput } from '../decimal.ts';
import { percentOf, usd } from '../money.ts';

/** Price in % of melt value, two digits after the dot, half away from zero; null when the melt value is zero. */
export function percentOfMelt(priceMinor: bigint, meltMinor: bigint): string | null {
  if (meltMinor <= 0n) return null;
  return fixed(dec(priceMinor).times(100).div(dec(meltMinor)), 2);
}

/** The sum that a percentage of melt value comes to, in cents, rounded once. Throws MeasureError of `parseDecimal`. */
export function priceAtPercentOfMelt(meltMinor: bigint, percent: string): bigint {
  return percentOf(usd(meltMinor), percent).minor;
}

/**
 * True when a price lies below its floor in % of melt value. Compared exactly, without rounding: a price exactly at
 * the floor is not below it. Throws MeasureError of `parseDecimal`.
 */
export function isBelowFloor(priceMinor: bigint, meltMinor: bigint, floorPercent: string): boolean {
  const floor: DecInput = parseDecimal(floorPercent, { field: '/floorPercent', min: '0' });
  return dec(priceMinor).times(100).lt(dec(meltMinor).times(floor));
}
