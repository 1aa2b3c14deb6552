import { dec, fixed, lastDigitOf, plain, type Dec } from './decimal.ts';
import { GRAMS_PER_UNIT, toGrams, type MassEntry } from './mass.ts';

/** What the seller stated: the gross mass as typed, and how finely the balance reads where that was given. */
export type StatedMass = { readonly gross: MassEntry; readonly readability: MassEntry | null };

/** `differenceGrams` is received minus stated, rounded to six digits, without trailing zeros. */
export type MassComparison = { readonly differenceGrams: string; readonly isWithinScales: boolean };

function stepGrams(mass: MassEntry): Dec {
  return lastDigitOf(mass.value).times(GRAMS_PER_UNIT[mass.unit]);
}

/**
 * Received mass against the stated one: the difference in grams, and whether two balances may show it for one piece. Each
 * may be off by one step of its display (common practice), so the two together by the sum of both steps, the limit
 * included. The step of the stated mass is its readability, else one unit of its last digit; the receiver's is one unit
 * of the last digit typed.
 * Throws MeasureError as `toGrams` does.
 */
export function compareReceivedMass({ gross, readability }: StatedMass, received: MassEntry): MassComparison {
  const difference = toGrams(received).minus(toGrams(gross));
  const statedStep =
    readability === null ? stepGrams(gross) : dec(readability.value).times(GRAMS_PER_UNIT[readability.unit]);
  const allowed = statedStep.plus(stepGrams(received));
  return { differenceGrams: plain(dec(fixed(difference, 6))), isWithinScales: difference.abs().lte(allowed) };
}
