import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import type { ReceivedFile } from '#server/middleware/receive-file.ts';
import type { LotPhoto } from '#server/models/lot-photo.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { addPhoto, assertTakesPhoto, type AddPhotoInput } from './add-photo.ts';
import { photoKey, putPhotoFiles, removePhotoFiles } from './photo-files.ts';
import { processPhoto } from './process-photo.ts';

/**
 * Takes in one photo: asks first whether the lot takes it, then encodes, then writes the bytes, then the rows. Bytes
 * without rows are removed again, and rows without bytes never come to be. Opens its own transactions, because encoding
 * and files have no place in one.
 */
export async function uploadPhoto(
  lotId: string,
  { name, content }: ReceivedFile,
  actor: Actor,
  extra: Pick<AddPhotoInput, 'isDrawing' | 'caption'> = {},
): Promise<LotPhoto> {
  await withTransaction({}, (unit) => assertTakesPhoto(lotId, unit, actor));
  const photo = await processPhoto(content);
  const fileId = newId();
  await putPhotoFiles(photoKey(fileId), photo);
  try {
    return await withTransaction({ lots: [lotId] }, (unit) =>
      addPhoto({ lotId, fileId, originalName: name, photo, ...extra }, unit, actor),
    );
  } catch (error) {
    await removePhotoFiles(photoKey(fileId));
    throw error;
  }
}
