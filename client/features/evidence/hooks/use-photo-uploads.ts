import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import { PHOTO_BYTES_MAX, PHOTOS_MAX } from '#shared/limits.ts';
import type { PhotoAnswer } from '#shared/schemas/lots.ts';
import { ApiProblem, newIdempotencyKey } from '../../../lib/api-client.ts';
import { ownLotQuery } from '../../../lib/lots.ts';
import { uploadPhoto } from '../api/photo-requests.ts';

export type PhotoUpload = {
  id: string;
  file: File;
  preview: string;
  share: number;
  /** Why it was not taken; null while it waits or travels. */
  refusal: string | null;
  /** True where nothing was wrong with the photo: no answer came. */
  canRetry: boolean;
};

const TOO_LARGE = `The photo is too large: at most ${PHOTO_BYTES_MAX / (1024 * 1024)} MB each.`;
const TOO_MANY = `A lot carries at most ${PHOTOS_MAX} photos.`;

/** Sends photos one after the other, each with its own progress; what is refused stays with its reason. */
export function usePhotoUploads(code: string, kept: number) {
  const client = useQueryClient();
  const [uploads, setUploads] = useState<PhotoUpload[]>([]);
  const queue = useRef<PhotoUpload[]>([]);
  const isRunning = useRef(false);
  const stop = useRef<AbortController | null>(null);
  const previews = useRef(new Set<string>());

  const change = useCallback((id: string, part: Partial<PhotoUpload>) => {
    setUploads((before) => before.map((upload) => (upload.id === id ? { ...upload, ...part } : upload)));
  }, []);
  const forget = useCallback((upload: PhotoUpload) => {
    setUploads((before) => before.filter((other) => other.id !== upload.id));
    URL.revokeObjectURL(upload.preview);
    previews.current.delete(upload.preview);
  }, []);

  const run = useCallback(async () => {
    if (isRunning.current) return;
    isRunning.current = true;
    const key = ownLotQuery(code).queryKey;
    for (let next = queue.current.shift(); next; next = queue.current.shift()) {
      const upload = next;
      const controller = new AbortController();
      stop.current = controller;
      try {
        const photo: PhotoAnswer = await uploadPhoto(code, upload.file, {
          signal: controller.signal,
          onProgress: (share) => change(upload.id, { share }),
        });
        client.setQueryData(key, (lot) => lot && { ...lot, photos: [...lot.photos, photo] });
        forget(upload);
      } catch (error) {
        if (controller.signal.aborted) break;
        const refusal = error instanceof Error ? error.message : 'The photo was not taken.';
        const isRefused = error instanceof ApiProblem && error.status < 429;
        change(upload.id, { refusal, canRetry: !isRefused });
      }
    }
    isRunning.current = false;
  }, [client, code, change, forget]);

  useEffect(() => {
    const shown = previews.current;
    return () => {
      queue.current = [];
      stop.current?.abort();
      for (const preview of shown) URL.revokeObjectURL(preview);
    };
  }, []);

  const add = (files: readonly File[]) => {
    const waiting = uploads.filter((upload) => upload.refusal === null).length;
    const fresh = files.map((file, at): PhotoUpload => {
      const preview = URL.createObjectURL(file);
      previews.current.add(preview);
      const isOver = kept + waiting + at >= PHOTOS_MAX;
      const refusal = file.size > PHOTO_BYTES_MAX ? TOO_LARGE : isOver ? TOO_MANY : null;
      return { id: newIdempotencyKey(), file, preview, share: 0, refusal, canRetry: false };
    });
    setUploads((before) => [...before, ...fresh]);
    queue.current.push(...fresh.filter((upload) => upload.refusal === null));
    void run();
  };
  const retry = (upload: PhotoUpload) => {
    change(upload.id, { refusal: null, share: 0 });
    queue.current.push(upload);
    void run();
  };
  return { uploads, add, retry, forget };
}
