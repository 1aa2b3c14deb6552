import type { LaboratoryAnswer } from '#shared/schemas/desk.ts';
import { Laboratory } from '#server/models/laboratory.ts';

/** The register of laboratories by name; those no longer active only for staff. */
export async function listLaboratories({ onlyActive }: { onlyActive: boolean }): Promise<Laboratory[]> {
  return Laboratory.findAll({
    where: onlyActive ? { isActive: true } : {},
    order: [
      ['name', 'ASC'],
      ['id', 'ASC'],
    ],
  });
}

/** All that the register says of a laboratory, for staff. */
export function registerEntryOf(laboratory: Laboratory): LaboratoryAnswer {
  const { id, name, accreditationBody, accreditationNumber, scope, region, contact, validUntil, isActive } =
    laboratory;
  return { id, name, accreditationBody, accreditationNumber, scope, region, contact, validUntil, isActive };
}
