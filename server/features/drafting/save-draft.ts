import type { LotDraft } from '#shared/schemas/lots.ts';
import { AppError, ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';

export type SaveDraftInput = { lotId: string; draft: LotDraft; version: number };

/**
 * Keeps a draft as typed, right or wrong. Two windows on one draft: the later save of an older version is refused and
 * nothing is overwritten. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`, `version-conflict`.
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
  return lot.update({ draft, draftVersion: version + 1 }, { transaction: unit.tx });
}
