import { dec } from '#shared/decimal.ts';
import { massInUnits, READING_UNITS, type ReadingUnit } from '#shared/mass-in-units.ts';
import { GRAMS_PER_UNIT, type MassEntry } from '#shared/mass.ts';

/** A valid mass in another unit, for reading (what is being typed goes through `parse-mass-text.ts` first); in the unit in which it was entered it is told as it was typed. */
export function massIn(entry: MassEntry, unit: ReadingUnit): string {
  if (entry.unit === unit) return entry.value;
  const grams = dec(entry.value).times(GRAMS_PER_UNIT[entry.unit]);
  return massInUnits(grams, unit)[0]?.value ?? entry.value;
}

/** The reader's unit first, then the others. */
export function readingUnits(first: ReadingUnit): ReadingUnit[] {
  return [first, ...READING_UNITS.filter((unit) => unit !== first)];
}
