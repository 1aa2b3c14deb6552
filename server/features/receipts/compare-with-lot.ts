import type { MassEntry, MassUnit } from '#shared/mass.ts';
import { compareReceivedMass, type MassComparison } from '#shared/received-mass.ts';
import { invariant } from '#server/app-error.ts';
import type { Lot } from '#server/models/lot.ts';

type Weighed = Pick<Lot, 'grossValue' | 'grossUnit' | 'readabilityValue' | 'readabilityUnit'>;

function entryOf(value: string | null, unit: string | null): MassEntry | null {
  return value === null || unit === null ? null : { value, unit: unit as MassUnit };
}

/** The received mass against what the sold lot states. */
export function compareWithLot(lot: Weighed, received: { value: string; unit: string }): MassComparison {
  const gross = entryOf(lot.grossValue, lot.grossUnit);
  invariant(gross !== null, 'a sold lot has its mass');
  const readability = entryOf(lot.readabilityValue, lot.readabilityUnit);
  return compareReceivedMass({ gross, readability }, received as MassEntry);
}
