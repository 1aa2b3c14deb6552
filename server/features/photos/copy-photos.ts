import { buffer } from 'node:stream/consumers';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { findLotPhotos } from '#server/features/lots/lot-queries.ts';
import { storage } from '#server/integrations/storage.ts';
import { Lot } from '#server/models/lot.ts';
import type { LotPhoto } from '#server/models/lot-photo.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { addPhoto, type AddPhotoInput } from './add-photo.ts';
import { photoKey, photoSizeKey, putPhotoFiles, removePhotoFiles } from './photo-files.ts';
import { PHOTO_SIZES, type ProcessedPhoto } from './process-photo.ts';

/** A photo whose bytes lie in the storage under a name of their own, and whose rows are not written yet. */
export type CopiedPhoto = Omit<AddPhotoInput, 'lotId'>;

/** The photo with its bytes, or null where they are not there any more. */
async function readPhoto({ file }: LotPhoto): Promise<ProcessedPhoto | null> {
  if (file === undefined) return null;
  const sizes: Partial<ProcessedPhoto['sizes']> = {};
  for (const size of PHOTO_SIZES) {
    const bytes = await storage.get(photoSizeKey(file.storageKey, size));
    if (bytes === null) return null;
    sizes[size] = await buffer(bytes);
  }
  const { width, height, sha256 } = file;
  return { sizes: sizes as ProcessedPhoto['sizes'], width: width ?? 0, height: height ?? 0, sha256 };
}

/** Removes the bytes of copies that came to nothing. */
export async function dropCopies(copies: readonly CopiedPhoto[]): Promise<void> {
  for (const { fileId } of copies) await removePhotoFiles(photoKey(fileId));
}

/**
 * Stores the photos of an own lot once more, in their order, for a draft that is to be made of it: each draft owns its
 * bytes, so that removing one never takes them from the other. No rows yet. A lot that is not the actor's gives none;
 * making the draft refuses it.
 */
export async function storeCopies(code: string, actor: Actor): Promise<CopiedPhoto[]> {
  const source = await Lot.findOne({ where: { code, sellerId: actor.id }, attributes: ['id', 'state'] });
  if (source === null || source.state === 'draft' || actor.suspendedAt !== null) return [];
  const copies: CopiedPhoto[] = [];
  try {
    for (const row of await findLotPhotos(source.id)) {
      const photo = await readPhoto(row);
      if (photo === null) continue;
      const fileId = newId();
      await putPhotoFiles(photoKey(fileId), photo);
      const { caption, isDrawing } = row;
      copies.push({ fileId, originalName: row.file?.originalName ?? '', photo, caption, isDrawing });
    }
    return copies;
  } catch (error) {
    await dropCopies(copies);
    throw error;
  }
}

/** Writes the rows of stored copies into a draft of the actor's. Throws as `addPhoto`. */
export async function addCopies(
  { lotId, copies }: { lotId: string; copies: readonly CopiedPhoto[] },
  unit: Unit,
  actor: Actor,
): Promise<void> {
  for (const copy of copies) await addPhoto({ lotId, ...copy }, unit, actor);
}
