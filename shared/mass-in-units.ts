import { fixed, type Dec } from './decimal.ts';
import { fromGrams, MASS_UNIT_LABELS, type MassUnit } from './mass.ts';

/** Units that a member can choose for reading, in the order shown. */
export const READING_UNITS = ['g', 'ozt', 'dwt', 'gr'] as const satisfies readonly MassUnit[];

/** A unit that a member can choose for reading. */
export type ReadingUnit = (typeof READING_UNITS)[number];

/** A mass shown in one unit: rounded for reading, never for computing. */
export type ShownMass = { readonly unit: ReadingUnit; readonly label: string; readonly value: string };

/** Digits after the dot when shown: each step is near a milligram or below. */
const SHOWN_PLACES: Readonly<Record<ReadingUnit, number>> = { g: 3, ozt: 6, dwt: 4, gr: 2 };

/** A mass in every reading unit, the reader's own first. Display only. */
export function massInUnits(grams: Dec, first: ReadingUnit = 'g'): ShownMass[] {
  const order = [first, ...READING_UNITS.filter((unit) => unit !== first)];
  return order.map((unit) => ({
    unit,
    label: MASS_UNIT_LABELS[unit],
    value: fixed(fromGrams(grams, unit), SHOWN_PLACES[unit]),
  }));
}
