import { createHash } from 'node:crypto';
import { fileTypeFromBuffer } from 'file-type';
import { DOCUMENT_BYTES_MAX } from '#shared/limits.ts';
import { AppError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { documentKey } from './certificate-files.ts';
import { removeFiles } from '#server/features/photos/remove-files.ts';
import { storage } from '#server/integrations/storage.ts';
import type { ReceivedFile } from '#server/middleware/receive-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { assertTakesDocument, attachCertificate, type CertificateFile } from './attach-certificate.ts';

const ACCEPTED_TYPES: ReadonlySet<string> = new Set(['application/pdf', 'image/jpeg', 'image/png']);

/** The media type by the document's own first bytes. Throws `document-not-accepted`, `document-too-large`. */
async function mediaTypeOf(content: Buffer): Promise<string> {
  if (content.byteLength > DOCUMENT_BYTES_MAX) throw new AppError('document-too-large');
  const found = await fileTypeFromBuffer(content);
  if (found === undefined || !ACCEPTED_TYPES.has(found.mime)) throw new AppError('document-not-accepted');
  return found.mime;
}

/**
 * Takes in a certificate's document and keeps it byte for byte: the desk compares it, and its digest tells it again. Bytes
 * without a row are removed again.
 */
export async function uploadCertificate(
  lotId: string,
  { name, content }: ReceivedFile,
  actor: Actor,
): Promise<CertificateFile> {
  await withTransaction({}, (unit) => assertTakesDocument(lotId, unit, actor));
  const file: CertificateFile = {
    fileId: newId(),
    fileName: name,
    mediaType: await mediaTypeOf(content),
    byteCount: content.byteLength,
    sha256: createHash('sha256').update(content).digest('hex'),
  };
  const key = documentKey(lotId, file.fileId);
  await storage.put(key, content, file.mediaType);
  try {
    const replaced = await withTransaction({ lots: [lotId] }, (unit) =>
      attachCertificate({ lotId, ...file }, unit, actor),
    );
    await removeFiles(replaced);
    return file;
  } catch (error) {
    await storage.remove(key);
    throw error;
  }
}
