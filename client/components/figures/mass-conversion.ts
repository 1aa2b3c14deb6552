import { fixed } from '#shared/decimal.ts';
import { fromGrams, toGrams, type MassEntry, type MassUnit } from '#shared/mass.ts';

const places: Record<MassUnit, number> = { g: 4, kg: 6, mg: 1, ozt: 6, dwt: 4, gr: 2, lb: 6, oz: 6 };

/** A mass in another unit, for reading beside the one that was entered; the entered one is told as it was typed. */
export function massIn(entry: MassEntry, unit: MassUnit): string {
  return entry.unit === unit ? entry.value : fixed(fromGrams(toGrams(entry), unit), places[unit]);
}

/** The reader's unit first, then grams and troy ounces where they say something new. */
export function massUnitsFor(readerUnit: MassUnit): MassUnit[] {
  return [...new Set<MassUnit>([readerUnit, 'g', 'ozt'])];
}
