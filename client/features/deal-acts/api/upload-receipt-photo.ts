import type { ReceiptPhotoAnswer } from '#shared/schemas/deals.ts';
import { apiUpload } from '../../../lib/api-client.ts';
import { dealUrl } from '../../../lib/deals.ts';

type Sending = { signal: AbortSignal; onProgress: (share: number) => void };

/** Uploads the photo of the weighing; it counts once the received mass is recorded with it. */
export function uploadReceiptPhoto(code: string, file: File, sending: Sending): Promise<ReceiptPhotoAnswer> {
  const body = new FormData();
  body.append('file', file, file.name);
  return apiUpload<ReceiptPhotoAnswer>(`${dealUrl(code)}/receipt-photo`, { body, ...sending });
}
