import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { photoKey, putPhotoFiles, removePhotoFiles } from '#server/features/photos/photo-files.ts';
import { PHOTO_MEDIA_TYPE, processPhoto } from '#server/features/photos/process-photo.ts';
import type { ReceivedFile } from '#server/middleware/receive-file.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { readDealToReceive } from './read-deal-to-receive.ts';

/**
 * Takes in the buyer's photo of the weighing; it belongs to the deal once the received mass is recorded with it. Bytes
 * without a row are removed again. Opens its own transactions, because encoding and files have no place in one.
 *
 * Throws `not-found`, `forbidden`, `illegal-transition`, `photo-not-an-image`, `photo-too-large`, `photo-broken`,
 * `storage-full`.
 */
export async function uploadReceiptPhoto(
  dealId: string,
  { name, content }: ReceivedFile,
  actor: Actor,
): Promise<StoredFile> {
  await withTransaction({}, (unit) => readDealToReceive(dealId, unit, actor));
  const photo = await processPhoto(content);
  const id = newId();
  const storageKey = photoKey(id);
  await putPhotoFiles(storageKey, photo);
  try {
    return await withTransaction({ deals: [dealId] }, async (unit) => {
      await readDealToReceive(dealId, unit, actor);
      return StoredFile.create(
        {
          id,
          ownerId: actor.id,
          kind: 'receipt_photo',
          sha256: photo.sha256,
          mediaType: PHOTO_MEDIA_TYPE,
          byteCount: photo.sizes[2000].byteLength,
          width: photo.width,
          height: photo.height,
          originalName: name,
          storageKey,
        },
        { transaction: unit.tx },
      );
    });
  } catch (error) {
    await removePhotoFiles(storageKey);
    throw error;
  }
}
