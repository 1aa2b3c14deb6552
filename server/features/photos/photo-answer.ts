import type { PhotoAnswer } from '#shared/schemas/lots.ts';
import type { LotPhoto } from '#server/models/lot-photo.ts';
import type { PhotoSize } from './process-photo.ts';

export function photoUrl(photoId: string, size: PhotoSize): string {
  return `/api/v1/photos/${photoId}/${size}`;
}

/** A photo with its three sizes; width and height are the largest one's. */
export function photoAnswerOf(photo: LotPhoto): PhotoAnswer {
  return {
    id: photo.id,
    caption: photo.caption,
    isDrawing: photo.isDrawing,
    thumb: photoUrl(photo.id, 240),
    medium: photoUrl(photo.id, 960),
    large: photoUrl(photo.id, 2000),
    width: photo.file?.width ?? 0,
    height: photo.file?.height ?? 0,
  };
}
