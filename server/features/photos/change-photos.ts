import { ConflictError, InvalidError, NotFoundError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';

async function readDraftPhotos(lotId: string, unit: Unit, actor: Actor): Promise<LotPhoto[]> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'draft') {
    throw new ConflictError('illegal-transition', 'Photos can change only while the lot is a draft.');
  }
  return LotPhoto.findAll({ where: { lotId }, transaction: unit.tx });
}

function findPhoto(photos: readonly LotPhoto[], photoId: string): LotPhoto {
  const photo = photos.find(({ id }) => id === photoId);
  if (photo === undefined) throw new NotFoundError();
  return photo;
}

/**
 * Removes a photo from a draft; answers the file whose bytes the caller removes after the commit. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function removePhoto(
  { lotId, photoId }: { lotId: string; photoId: string },
  unit: Unit,
  actor: Actor,
): Promise<StoredFile[]> {
  const photo = findPhoto(await readDraftPhotos(lotId, unit, actor), photoId);
  const files = await StoredFile.findAll({ where: { id: photo.fileId }, transaction: unit.tx });
  await photo.destroy({ transaction: unit.tx });
  await StoredFile.destroy({ where: { id: photo.fileId }, transaction: unit.tx });
  return files;
}

/**
 * Puts the photos of a draft in order; every one of them is named once. Expects the lot's lock.
 * Throws `invalid-input`, `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function orderPhotos(
  { lotId, photoIds }: { lotId: string; photoIds: readonly string[] },
  unit: Unit,
  actor: Actor,
): Promise<void> {
  const photos = await readDraftPhotos(lotId, unit, actor);
  const named = new Set(photoIds);
  if (
    named.size !== photoIds.length ||
    named.size !== photos.length ||
    photos.some(({ id }) => !named.has(id))
  ) {
    const message = 'Name each photo of the lot once.';
    throw new InvalidError([{ pointer: '/photoIds', code: 'photos-differ', message }]);
  }
  for (const [position, photoId] of photoIds.entries()) {
    await findPhoto(photos, photoId).update({ position }, { transaction: unit.tx });
  }
}

/**
 * Writes a photo's caption. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function captionPhoto(
  { lotId, photoId, caption }: { lotId: string; photoId: string; caption: string },
  unit: Unit,
  actor: Actor,
): Promise<void> {
  const photo = findPhoto(await readDraftPhotos(lotId, unit, actor), photoId);
  await photo.update({ caption: caption.trim() }, { transaction: unit.tx });
}
