import { storage } from '#server/integrations/storage.ts';
import { PHOTO_MEDIA_TYPE, PHOTO_SIZES, type PhotoSize, type ProcessedPhoto } from './process-photo.ts';

/** The key in a photo's file row; its sizes lie under it. */
export function photoKey(fileId: string): string {
  return `photos/${fileId}`;
}

export function photoSizeKey(storageKey: string, size: PhotoSize): string {
  return `${storageKey}/${size}.webp`;
}

/** Removes every size of a photo; none is missed when it is gone already. */
export async function removePhotoFiles(storageKey: string): Promise<void> {
  await Promise.all(PHOTO_SIZES.map((size) => storage.remove(photoSizeKey(storageKey, size))));
}

/** Writes all sizes or none. Throws `storage-full`. */
export async function putPhotoFiles(storageKey: string, { sizes }: ProcessedPhoto): Promise<void> {
  try {
    for (const size of PHOTO_SIZES) {
      await storage.put(photoSizeKey(storageKey, size), sizes[size], PHOTO_MEDIA_TYPE);
    }
  } catch (error) {
    await removePhotoFiles(storageKey);
    throw error;
  }
}
