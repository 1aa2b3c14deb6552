import type { PhotoAnswer, PhotosAnswer } from '#shared/schemas/lots.ts';
import { apiSend, apiUpload } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

type Sending = { signal: AbortSignal; onProgress: (share: number) => void };

function formOf(file: File): FormData {
  const body = new FormData();
  body.append('file', file, file.name);
  return body;
}

export function uploadPhoto(code: string, file: File, sending: Sending): Promise<PhotoAnswer> {
  return apiUpload<PhotoAnswer>(`${lotUrl(code)}/photos`, { body: formOf(file), ...sending });
}

export function removePhoto(code: string, photoId: string): Promise<PhotosAnswer> {
  return apiSend<PhotosAnswer>(`${lotUrl(code)}/photos/${photoId}`, { method: 'DELETE' });
}

export function orderPhotos(code: string, photoIds: string[]): Promise<PhotosAnswer> {
  return apiSend<PhotosAnswer>(`${lotUrl(code)}/photos/order`, { method: 'PUT', body: { photoIds } });
}

export function captionPhoto(code: string, photoId: string, caption: string): Promise<PhotosAnswer> {
  return apiSend<PhotosAnswer>(`${lotUrl(code)}/photos/${photoId}/caption`, {
    method: 'PUT',
    body: { caption },
  });
}
