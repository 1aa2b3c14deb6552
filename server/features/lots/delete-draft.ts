import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { dropUnusedDocuments } from '#server/features/lot-documents/certificate-files.ts';
import { canDeleteDraft } from './lot-policy.ts';
import { readOwnLot } from './own-lot.ts';

/**
 * Removes a draft that the desk has never seen, with its photos and documents; answers the files whose bytes the caller
 * removes after the commit. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function deleteDraft(
  { lotId }: { lotId: string },
  unit: Unit,
  actor: Actor,
): Promise<StoredFile[]> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (!canDeleteDraft(actor, lot)) {
    throw new ConflictError('illegal-transition', 'Only a draft that was never submitted can be deleted.');
  }
  const photos = await LotPhoto.findAll({ where: { lotId }, transaction: unit.tx });
  const files = await StoredFile.findAll({
    where: { id: photos.map((photo) => photo.fileId) },
    transaction: unit.tx,
  });
  await LotPhoto.destroy({ where: { lotId }, transaction: unit.tx });
  await StoredFile.destroy({ where: { id: files.map((file) => file.id) }, transaction: unit.tx });
  const documents = await dropUnusedDocuments(lotId, null, unit);
  await lot.destroy({ transaction: unit.tx });
  return [...files, ...documents];
}
