import { dec, fixed, lastDigitOf, plain } from '#shared/decimal.ts';
import { GRAMS_PER_UNIT, toGrams, type MassUnit } from '#shared/mass.ts';
import { invariant } from '#server/app-error.ts';
import type { Lot } from '#server/models/lot.ts';

type Weighed = Pick<Lot, 'grossValue' | 'grossUnit' | 'readabilityValue' | 'readabilityUnit'>;

/**
 * Received mass against the lot's gross mass: the difference in grams, and whether two balances may show it for one piece.
 * Each may be off by one unit of its last digit (common practice: the display's step either way), so the two together by the
 * sum of both steps. The receiver's readability is one unit of the last digit typed.
 */
export function compareReceivedMass(
  lot: Weighed,
  received: { value: string; unit: string },
): { differenceGrams: string; isWithinScales: boolean } {
  invariant(lot.grossValue !== null && lot.grossUnit !== null, 'a sold lot has its mass');
  const gross = { value: lot.grossValue, unit: lot.grossUnit as MassUnit };
  const typed = { value: received.value, unit: received.unit as MassUnit };
  const stepOf = (mass: typeof gross) => lastDigitOf(mass.value).times(GRAMS_PER_UNIT[mass.unit]);
  const lotStep =
    lot.readabilityValue === null || lot.readabilityUnit === null
      ? stepOf(gross)
      : dec(lot.readabilityValue).times(GRAMS_PER_UNIT[lot.readabilityUnit as MassUnit]);
  const difference = toGrams(typed).minus(toGrams(gross));
  const allowed = lotStep.plus(stepOf(typed));
  return { differenceGrams: plain(dec(fixed(difference, 6))), isWithinScales: difference.abs().lte(allowed) };
}
