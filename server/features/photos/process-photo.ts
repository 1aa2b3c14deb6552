import { createHash } from 'node:crypto';
import { fileTypeFromBuffer } from 'file-type';
import sharp, { type Sharp } from 'sharp';
import { PHOTO_BYTES_MAX, PHOTO_PIXELS_MAX } from '#shared/limits.ts';
import { AppError } from '#server/app-error.ts';

/** Longest side of each size kept, in pixels. */
export const PHOTO_SIZES = [240, 960, 2000] as const;
export type PhotoSize = (typeof PHOTO_SIZES)[number];

export const PHOTO_MEDIA_TYPE = 'image/webp';
const ACCEPTED_TYPES: ReadonlySet<string> = new Set(['image/jpeg', 'image/png', 'image/webp', 'image/avif']);

export type ProcessedPhoto = {
  sizes: Record<PhotoSize, Buffer>;
  width: number;
  height: number;
  /** Of the bytes as they came, so that the same photo is known again. */
  sha256: string;
};

async function assertImage(content: Buffer): Promise<void> {
  if (content.byteLength > PHOTO_BYTES_MAX) throw new AppError('photo-too-large');
  // The bytes decide; a name or a type that the sender claims is worth nothing.
  const found = await fileTypeFromBuffer(content);
  if (found === undefined || !ACCEPTED_TYPES.has(found.mime)) throw new AppError('photo-not-an-image');
}

async function assertPixels(content: Buffer): Promise<void> {
  const { width, height } = await sharp(content, { limitInputPixels: false }).metadata();
  if (width * height > PHOTO_PIXELS_MAX) {
    throw new AppError('photo-too-large', 'The photo has more than 60 million pixels.');
  }
}

async function encode(source: Sharp, size: PhotoSize) {
  return source
    .clone()
    .resize({ width: size, height: size, fit: 'inside', withoutEnlargement: true })
    .webp({ quality: 82, effort: 3 })
    .toBuffer({ resolveWithObject: true });
}

/**
 * Decodes a photo and encodes it anew in three sizes: turned upright, without any metadata of the camera or the place,
 * nothing of the original bytes kept.
 * Throws `photo-too-large`, `photo-not-an-image`, `photo-broken`.
 */
export async function processPhoto(content: Buffer): Promise<ProcessedPhoto> {
  await assertImage(content);
  try {
    await assertPixels(content);
    // Decoded once, upright, at the largest size kept; the smaller ones are made from that.
    const upright = await sharp(content, { limitInputPixels: PHOTO_PIXELS_MAX, failOn: 'warning' })
      .rotate()
      .resize({ width: 2000, height: 2000, fit: 'inside', withoutEnlargement: true })
      .toColourspace('srgb')
      .raw()
      .toBuffer({ resolveWithObject: true });
    const { width, height, channels } = upright.info;
    const source = sharp(upright.data, { raw: { width, height, channels } });
    const [small, medium, large] = await Promise.all(PHOTO_SIZES.map((size) => encode(source, size)));
    return {
      sizes: { 240: small!.data, 960: medium!.data, 2000: large!.data },
      width: large!.info.width,
      height: large!.info.height,
      sha256: createHash('sha256').update(content).digest('hex'),
    };
  } catch (error) {
    if (error instanceof AppError) throw error;
    throw new AppError('photo-broken');
  }
}
