import { MeasureError } from '#shared/domain-error.ts';
import { toGrams, type MassEntry, type MassUnit } from '#shared/mass.ts';
import { parseMassText } from '#shared/parse-mass-text.ts';
import type { Reading } from '../../lib/use-form.ts';

export type ReceivedValues = { mass: string; unit: string };

/** The mass as typed, with dot or comma, checked as the server will; faults stand at the field of the mass. */
export function readReceivedMass({ mass, unit }: ReceivedValues): Reading<MassEntry> {
  try {
    const entry: MassEntry = { value: parseMassText(mass, '/mass'), unit: unit as MassUnit };
    toGrams(entry, '/mass');
    return { input: entry, faults: null };
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    return { input: null, faults: error.issues.map(({ message }) => ({ pointer: '/mass', message })) };
  }
}
