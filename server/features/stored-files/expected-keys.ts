import { photoSizeKey } from '#server/features/photos/photo-files.ts';
import { PHOTO_SIZES } from '#server/features/photos/process-photo.ts';
import type { StoredFile } from '#server/models/stored-file.ts';

/** The objects that a file's row stands for: a photo lies there in all its sizes. */
export function expectedKeys({ kind, storageKey }: Pick<StoredFile, 'kind' | 'storageKey'>): string[] {
  if (kind !== 'photo' && kind !== 'receipt_photo') return [storageKey];
  return PHOTO_SIZES.map((size) => photoSizeKey(storageKey, size));
}

/** The keys under which the row of an object may stand. */
export function rowKeysOf(objectKey: string): string[] {
  const folder = objectKey.slice(0, Math.max(0, objectKey.lastIndexOf('/')));
  return folder === '' ? [objectKey] : [objectKey, folder];
}
