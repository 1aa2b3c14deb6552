import { Op } from 'sequelize';
import type { Unit } from '#server/database/transaction.ts';
import { Certificate } from '#server/models/certificate.ts';
import { StoredFile } from '#server/models/stored-file.ts';

/** A document's key names the lot it was uploaded for, so that what is left over can be found again. */
export function documentKey(lotId: string, fileId: string): string {
  return `certificates/${lotId}/${fileId}`;
}

/**
 * Removes the rows of documents uploaded for a lot that no certificate and not its draft (`keptId`) refers to; answers
 * them, for their bytes to be removed after the commit. A copy refers only to documents of a lot that was submitted, which
 * its certificate keeps.
 */
export async function dropUnusedDocuments(
  lotId: string,
  keptId: string | null,
  unit: Unit,
): Promise<StoredFile[]> {
  const files = await StoredFile.findAll({
    where: { kind: 'certificate', storageKey: { [Op.startsWith]: documentKey(lotId, '') } },
    transaction: unit.tx,
  });
  const candidates = files.filter((file) => file.id !== keptId);
  if (candidates.length === 0) return [];
  const used = await Certificate.findAll({
    where: { fileId: candidates.map((file) => file.id) },
    attributes: ['fileId'],
    transaction: unit.tx,
  });
  const usedIds = new Set(used.map((certificate) => certificate.fileId));
  const unused = candidates.filter((file) => !usedIds.has(file.id));
  await StoredFile.destroy({ where: { id: unused.map((file) => file.id) }, transaction: unit.tx });
  return unused;
}
