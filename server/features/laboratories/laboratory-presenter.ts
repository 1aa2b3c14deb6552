import type { LaboratoryAnswer } from '#shared/schemas/desk.ts';
import type { Laboratory } from '#server/models/laboratory.ts';
import { registerEntryOf } from './laboratory-queries.ts';

/** A laboratory of the register; how the desk reaches it is for staff alone. */
export function presentLaboratory(laboratory: Laboratory, isForStaff: boolean): LaboratoryAnswer {
  const entry = registerEntryOf(laboratory);
  return isForStaff ? entry : { ...entry, contact: '' };
}
