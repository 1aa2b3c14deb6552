import { dec, fixed, lastDigitOf, plain } from '#shared/decimal.ts';
import { GRAMS_PER_UNIT, toGrams, type MassUnit } from '#shared/mass.ts';
import { COVERAGE_FACTOR, readabilityUncertainty, rss } from '#shared/uncertainty.ts';
import { invariant } from '#server/app-error.ts';
import type { Lot } from '#server/models/lot.ts';

type Weighed = Pick<Lot, 'grossValue' | 'grossUnit' | 'readabilityValue' | 'readabilityUnit'>;

/**
 * Received mass against the lot's gross mass: the difference in grams, and whether it lies within the expanded uncertainty
 * (k = 2) of the two weighings together (GUM 5.1.2, each balance's readability as a rectangle). The receiver's readability
 * is one unit of the last digit typed.
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
  const allowed = rss([readabilityUncertainty(lotStep), readabilityUncertainty(stepOf(typed))]).times(
    COVERAGE_FACTOR,
  );
  return { differenceGrams: plain(dec(fixed(difference, 6))), isWithinScales: difference.abs().lte(allowed) };
}
