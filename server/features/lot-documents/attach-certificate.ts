import { lotDraft } from '#shared/schemas/lots.ts';
import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { documentKey, dropUnusedDocuments } from './certificate-files.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';

export type CertificateFile = {
  fileId: string;
  fileName: string;
  mediaType: string;
  byteCount: number;
  sha256: string;
};

/** Refuses a document that the lot cannot take. Throws `illegal-transition` and those of `readOwnLot`. */
export async function assertTakesDocument(lotId: string, unit: Unit, actor: Actor): Promise<void> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'draft') {
    throw new ConflictError(
      'illegal-transition',
      'The certificate can change only while the lot is a draft.',
    );
  }
}

/**
 * Writes the row of a document whose bytes lie in the storage already and refers the draft to it, without counting as a
 * save of the draft. Answers the documents that this one replaces, whose bytes the caller removes after the commit.
 * Expects the lot's lock. Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function attachCertificate(
  { lotId, ...file }: CertificateFile & { lotId: string },
  unit: Unit,
  actor: Actor,
): Promise<StoredFile[]> {
  const lot = await readOwnLot(lotId, unit, actor);
  await assertTakesDocument(lotId, unit, actor);
  await StoredFile.create(
    {
      id: file.fileId,
      ownerId: actor.id,
      kind: 'certificate',
      sha256: file.sha256,
      mediaType: file.mediaType,
      byteCount: file.byteCount,
      originalName: file.fileName,
      storageKey: documentKey(lotId, file.fileId),
    },
    { transaction: unit.tx },
  );
  const draft = lotDraft.parse(lot.draft);
  const certificate = { ...draft.certificate, fileId: file.fileId, fileName: file.fileName };
  await lot.update({ draft: { ...draft, certificate } }, { transaction: unit.tx });
  return dropUnusedDocuments(lotId, file.fileId, unit);
}
