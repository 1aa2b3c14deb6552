import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from './move-lot.ts';
import { readOwnLot } from './own-lot.ts';

/**
 * Takes an open lot off the register until the seller reopens it; its closing day stays. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function pauseLot({ lotId }: { lotId: string }, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  return moveLot(lot, 'paused', { act: 'paused', actorKind: 'seller', actorId: actor.id }, unit);
}
