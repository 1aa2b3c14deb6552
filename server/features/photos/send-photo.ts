import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import { z } from 'zod';
import { NotFoundError } from '#server/app-error.ts';
import { storage } from '#server/integrations/storage.ts';
import { photoSizeKey } from './photo-files.ts';
import { PHOTO_MEDIA_TYPE, PHOTO_SIZES } from './process-photo.ts';

/** The size in an address, as the text that it is there. */
export const photoSizeText = z.enum(PHOTO_SIZES.map(String) as [string, ...string[]]);

/** Sends the bytes of a photo in one of its sizes. Throws `not-found` where they are not there. */
export async function sendPhoto(
  { storageKey, size: sizeText, isPublic }: { storageKey: string; size: string; isPublic: boolean },
  res: Response,
): Promise<void> {
  const size = PHOTO_SIZES.find((known) => String(known) === sizeText);
  const bytes = size === undefined ? null : await storage.get(photoSizeKey(storageKey, size));
  if (bytes === null) throw new NotFoundError();
  res.set({
    'Content-Type': PHOTO_MEDIA_TYPE,
    'Cache-Control': isPublic ? 'public, max-age=31536000, immutable' : 'private, no-store',
    'Content-Security-Policy': "default-src 'none'; sandbox",
    'X-Content-Type-Options': 'nosniff',
  });
  await pipeline(bytes, res);
}
