import { massInUnits, READING_UNITS, type ReadingUnit } from '#shared/mass-in-units.ts';
import { toGrams, type MassEntry } from '#shared/mass.ts';

/** A mass in another unit, for reading; in the unit in which it was entered it is told as it was typed. */
export function massIn(entry: MassEntry, unit: ReadingUnit): string {
  if (entry.unit === unit) return entry.value;
  return massInUnits(toGrams(entry), unit)[0]?.value ?? entry.value;
}

/** The reader's unit first, then the others. */
export function readingUnits(first: ReadingUnit): ReadingUnit[] {
  return [first, ...READING_UNITS.filter((unit) => unit !== first)];
}
