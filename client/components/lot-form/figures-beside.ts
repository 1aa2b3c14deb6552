import { fixed, plain, dec } from '#shared/decimal.ts';
import { MeasureError } from '#shared/domain-error.ts';
import { FINENESS_UNIT_LABELS, FINENESS_UNITS, fromPermille, toPermille } from '#shared/fineness.ts';
import { readFineness, readMass, type TypedQuantity } from '#shared/lot-contents.ts';
import { massInUnits, type ReadingUnit } from '#shared/mass-in-units.ts';
import { toGrams } from '#shared/mass.ts';

function unlessRefused<T>(step: () => T): T | null {
  try {
    return step();
  } catch (error) {
    if (error instanceof MeasureError) return null;
    throw error;
  }
}

export type Beside = { value: string; unit: string };

/** The mass being typed in the other units, the reader's own first; nothing while it cannot be read. */
export function massBeside(typed: TypedQuantity, reader: ReadingUnit): Beside[] {
  const grams = unlessRefused(() => toGrams(readMass(typed, '', '')));
  if (!grams) return [];
  return massInUnits(grams, reader)
    .filter((shown) => shown.unit !== typed.unit)
    .map(({ value, label }) => ({ value, unit: label }));
}

/** The fineness being typed in ‰, karat and percent, but for the unit it is typed in. */
export function finenessBeside(typed: TypedQuantity): Beside[] {
  const permille = unlessRefused(() => toPermille(readFineness(typed, '', '')));
  if (!permille) return [];
  return FINENESS_UNITS.filter((unit) => unit !== typed.unit && unit !== 'gpt').map((unit) => ({
    value: plain(dec(fixed(fromPermille(permille, unit), 3))),
    unit: FINENESS_UNIT_LABELS[unit],
  }));
}

/** The fineness being typed in ‰, for holding it against a method's range. */
export function permilleTyped(typed: TypedQuantity) {
  return unlessRefused(() => toPermille(readFineness(typed, '', '')));
}
