import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { PhotosAnswer } from '#shared/schemas/lots.ts';
import { ownLotQuery } from '../../../lib/lots.ts';
import { captionPhoto, orderPhotos, removePhoto } from '../api/photo-requests.ts';

type PhotoChange =
  | { act: 'remove'; photoId: string }
  | { act: 'order'; photoIds: string[] }
  | { act: 'caption'; photoId: string; caption: string };

function send(code: string, change: PhotoChange): Promise<PhotosAnswer> {
  if (change.act === 'remove') return removePhoto(code, change.photoId);
  if (change.act === 'order') return orderPhotos(code, change.photoIds);
  return captionPhoto(code, change.photoId, change.caption);
}

/** Removes, orders and captions the photos of a draft; the answer is how they then stand. */
export function usePhotoChanges(code: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: PhotoChange) => send(code, change),
    onSuccess: ({ photos }) => {
      client.setQueryData(ownLotQuery(code).queryKey, (lot) => lot && { ...lot, photos });
    },
  });
}
