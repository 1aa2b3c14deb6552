import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import { DOCUMENT_BYTES_MAX } from '#shared/limits.ts';
import { idParam } from '#shared/schemas/common.ts';
import { certificateFileAnswer, lotParams } from '#shared/schemas/lots.ts';
import { NotFoundError } from '#server/app-error.ts';
import { findReadableDocument } from '#server/features/lots/document-queries.ts';
import { lotIdOf } from '#server/features/lots/own-lot.ts';
import { storage } from '#server/integrations/storage.ts';
import { receivedFile, receiveFile } from '#server/middleware/receive-file.ts';
import type { StoredFile } from '#server/models/stored-file.ts';
import { defineRoute, type RouteDefinition } from '#server/routing/define-route.ts';
import { uploadCertificate } from './upload-certificate.ts';

/** Viewers of PDF that browsers bring do not start in a sandbox; a PDF cannot run script of ours anyway. */
function contentPolicyOf(mediaType: string): string {
  const common = "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'self'";
  return mediaType === 'application/pdf' ? `${common}; object-src 'self'` : `${common}; sandbox`;
}

function dispositionOf(name: string): string {
  const ascii = name.replace(/[^\x20-\x7e]|["\\%;]/g, '_');
  const encoded = encodeURIComponent(name).replace(
    /['()*]/g,
    (sign) => `%${sign.charCodeAt(0).toString(16)}`,
  );
  return `inline; filename="${ascii}"; filename*=UTF-8''${encoded}`;
}

async function sendDocument(file: StoredFile, res: Response): Promise<void> {
  const bytes = await storage.get(file.storageKey);
  if (bytes === null) throw new NotFoundError();
  res.set({
    'Content-Type': file.mediaType,
    'Content-Length': String(file.byteCount),
    'Content-Disposition': dispositionOf(file.originalName),
    'Cache-Control': 'private, no-store',
    'Content-Security-Policy': contentPolicyOf(file.mediaType),
    'X-Content-Type-Options': 'nosniff',
    'X-Frame-Options': 'SAMEORIGIN',
  });
  await pipeline(bytes, res);
}

export const documentRoutes: RouteDefinition[] = [
  defineRoute({
    method: 'post',
    path: '/api/v1/lots/:code/certificate',
    summary: 'Uploads the certificate of a draft: PDF, JPEG or PNG',
    access: 'member',
    limit: 'upload',
    params: lotParams,
    answer: certificateFileAnswer,
    before: [receiveFile(DOCUMENT_BYTES_MAX, 'document-too-large')],
    handle: async ({ params, req, res, actor }) => {
      const lotId = await lotIdOf(params.code);
      const file = await uploadCertificate(lotId, receivedFile(req), actor);
      const { fileId, fileName, mediaType, byteCount } = file;
      res.status(201).json({ fileId, fileName, mediaType, byteCount });
    },
  }),
  defineRoute({
    method: 'get',
    path: '/api/v1/certificates/:id/document',
    summary: 'The document of a certificate: for the seller, the desk, and the buyer from funding on',
    access: 'member',
    limit: 'read',
    params: idParam,
    handle: async ({ params, res, actor }) => sendDocument(await findReadableDocument(params.id, actor), res),
  }),
];
