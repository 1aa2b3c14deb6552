import { MeasureError } from '#shared/domain-error.ts';
import { toGrams, type MassEntry, type MassUnit } from '#shared/mass.ts';
import { parseMassText } from '#shared/parse-mass-text.ts';
import type { Reading } from '../../lib/use-form.ts';

export type ReceivedValues = { mass: string; unit: string; photoFileId: string };
export type Receipt = { mass: MassEntry; photoFileId: string | null };
type Photo = { sending: object | null; taken: { fileId: string } | null };

/** The mass as typed, with dot or comma, checked as the server will; faults stand at the field of the mass. */
export function readReceivedMass({ mass, unit }: Pick<ReceivedValues, 'mass' | 'unit'>): Reading<MassEntry> {
  try {
    const entry: MassEntry = { value: parseMassText(mass, '/mass'), unit: unit as MassUnit };
    toGrams(entry, '/mass');
    return { input: entry, faults: null };
  } catch (error) {
    if (!(error instanceof MeasureError)) throw error;
    return { input: null, faults: error.issues.map(({ message }) => ({ pointer: '/mass', message })) };
  }
}

/** The mass with its photo, where there is one; not while the photo is still on its way. */
export function readReceipt(values: ReceivedValues, { sending, taken }: Photo): Reading<Receipt> {
  const reading = readReceivedMass(values);
  const late = {
    pointer: '/photoFileId',
    message: 'The photo is still on its way: wait until it has arrived.',
  };
  const faults = [...(reading.faults ?? []), ...(sending === null ? [] : [late])];
  if (reading.input === null || faults.length > 0) return { input: null, faults };
  return { input: { mass: reading.input, photoFileId: taken?.fileId ?? null }, faults: null };
}
