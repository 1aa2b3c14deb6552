import { PHOTOS_MAX } from '#shared/limits.ts';
import { ConflictError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';
import { LotPhoto } from '#server/models/lot-photo.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { photoKey } from './photo-files.ts';
import { PHOTO_MEDIA_TYPE, type ProcessedPhoto } from './process-photo.ts';

export type AddPhotoInput = {
  lotId: string;
  fileId: string;
  originalName: string;
  photo: ProcessedPhoto;
  isDrawing?: boolean;
  caption?: string;
};

/** Refuses a photo that the lot cannot take. Throws `illegal-transition`, `photo-limit-reached` and those of `readOwnLot`. */
export async function assertTakesPhoto(lotId: string, unit: Unit, actor: Actor): Promise<number> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'draft') {
    throw new ConflictError('illegal-transition', 'Photos can change only while the lot is a draft.');
  }
  const photos = await LotPhoto.findAll({ where: { lotId }, transaction: unit.tx });
  if (photos.length >= PHOTOS_MAX) throw new ConflictError('photo-limit-reached');
  return photos.reduce((next, { position }) => Math.max(next, position + 1), 0);
}

/**
 * Writes the rows of a photo whose bytes lie in the storage already; when it throws, the caller removes the bytes. Expects
 * the lot's lock, under which photos are counted.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`, `photo-limit-reached`.
 */
export async function addPhoto(input: AddPhotoInput, unit: Unit, actor: Actor): Promise<LotPhoto> {
  const { lotId, fileId, originalName, photo } = input;
  const position = await assertTakesPhoto(lotId, unit, actor);
  const file = await StoredFile.create(
    {
      id: fileId,
      ownerId: actor.id,
      kind: 'photo',
      sha256: photo.sha256,
      mediaType: PHOTO_MEDIA_TYPE,
      byteCount: photo.sizes[2000].byteLength,
      width: photo.width,
      height: photo.height,
      originalName,
      storageKey: photoKey(fileId),
    },
    { transaction: unit.tx },
  );
  const row = await LotPhoto.create(
    {
      id: newId(),
      lotId,
      fileId,
      position,
      caption: input.caption ?? '',
      isDrawing: input.isDrawing ?? false,
    },
    { transaction: unit.tx },
  );
  row.file = file;
  return row;
}
