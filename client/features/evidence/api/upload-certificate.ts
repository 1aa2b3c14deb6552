import type { z } from 'zod';
import type { certificateFileAnswer } from '#shared/schemas/lots.ts';
import { apiUpload } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

export type CertificateFile = z.infer<typeof certificateFileAnswer>;

type Sending = { signal: AbortSignal; onProgress: (share: number) => void };

/** Uploads the document of a draft's certificate: PDF, JPEG or PNG. */
export function uploadCertificate(code: string, file: File, sending: Sending): Promise<CertificateFile> {
  const body = new FormData();
  body.append('file', file, file.name);
  return apiUpload<CertificateFile>(`${lotUrl(code)}/certificate`, { body, ...sending });
}
