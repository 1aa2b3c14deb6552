import type { Unit } from '#server/database/transaction.ts';
import type { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { readOwnLot } from '#server/features/lots/own-lot.ts';

/**
 * Takes a lot that the desk returned back into drafting, with everything typed still there. Expects the lot's lock.
 * Throws `not-found`, `forbidden`, `member-suspended`, `illegal-transition`.
 */
export async function redraftLot({ lotId }: { lotId: string }, unit: Unit, actor: Actor): Promise<Lot> {
  const lot = await readOwnLot(lotId, unit, actor);
  return moveLot(lot, 'draft', { act: 'redrafted', actorKind: 'seller', actorId: actor.id }, unit);
}
