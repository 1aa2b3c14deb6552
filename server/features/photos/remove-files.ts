import { storage } from '#server/integrations/storage.ts';
import { logger } from '#server/logger.ts';
import type { StoredFile } from '#server/models/stored-file.ts';
import { removePhotoFiles } from './photo-files.ts';

/** Removes the bytes of files whose rows are gone, after the commit; a failure is logged, for the work itself is done. */
export async function removeFiles(files: readonly Pick<StoredFile, 'kind' | 'storageKey'>[]): Promise<void> {
  for (const { kind, storageKey } of files) {
    try {
      if (kind === 'photo' || kind === 'receipt_photo') await removePhotoFiles(storageKey);
      else await storage.remove(storageKey);
    } catch (error) {
      logger.error({ err: error as Error, storageKey }, 'bytes of a removed file are still there');
    }
  }
}
