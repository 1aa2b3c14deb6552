import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from './move-lot.ts';
import { readOwnLot } from './own-lot.ts';

/**
 * Puts a paused lot back on the register, unless its closing day has come meanwhile. Only the seller does this. Expects
 * the lot's lock. Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`, `deadline-passed`.
 */
export async function reopenLot({ lotId }: { lotId: string }, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  if (lot.state !== 'paused') {
    throw new ConflictError('illegal-transition', 'Only a paused lot can be reopened.');
  }
  if (lot.closesAt !== null && lot.closesAt <= unit.now) throw new ConflictError('deadline-passed');
  return moveLot(
    lot,
    'open',
    { act: 'reopened', actorKind: 'seller', actorId: actor.id, changes: { stateReason: null } },
    unit,
  );
}
