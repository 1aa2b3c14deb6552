import type { LotDraft } from '#shared/schemas/lots.ts';
import { AppError, ConflictError, InvalidError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import { StoredFile } from '#server/models/stored-file.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';

/** A draft refers only to a document that its seller has uploaded: no one gets at another's by naming its id. */
async function assertOwnDocument(fileId: string | null, unit: Unit, actor: Actor): Promise<void> {
  if (fileId === null) return;
  const where = { id: fileId, ownerId: actor.id, kind: 'certificate' } as const;
  if ((await StoredFile.count({ where, transaction: unit.tx })) > 0) return;
  const pointer = '/draft/certificate/fileId';
  throw new InvalidError([
    { pointer, code: 'file-unknown', message: 'Upload the certificate’s document again.' },
  ]);
}

export type SaveDraftInput = { lotId: string; draft: LotDraft; version: number };

/**
 * Keeps a draft as typed, right or wrong. Two windows on one draft: the later save of an older version is refused and
 * nothing is overwritten. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`, `version-conflict`,
 * `invalid-input` for a document that is not the seller's.
 */
export async function saveDraft(
  { lotId, draft, version }: SaveDraftInput,
  unit: Unit,
  actor: Actor,
): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'draft') {
    throw new ConflictError('illegal-transition', 'Only a draft can be changed.');
  }
  if (lot.draftVersion !== version) throw new AppError('version-conflict');
  await assertOwnDocument(draft.certificate.fileId, unit, actor);
  return lot.update({ draft, draftVersion: version + 1 }, { transaction: unit.tx });
}
