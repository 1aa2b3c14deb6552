import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { mailDealAccepted } from './deal-mails.ts';
import { moveDeal } from './move-deal.ts';
import { assertNotFrozen, assertState, readDealFor } from './read-own-deal.ts';
import { settleDeal } from './settle-deal.ts';

/**
 * The buyer accepts what he has weighed; the deal is settled in the same transaction, and the release ordered. Late is as
 * good as in time: nothing was decided by the silence in between.
 *
 * Locks the deal. Throws `not-found`, `forbidden`, `deal-frozen`, `illegal-transition`, `deal-not-funded`.
 */
export async function acceptDeal(dealId: string, unit: Unit, actor: Actor): Promise<Deal> {
  const deal = await readDealFor('buyer', dealId, unit, actor);
  assertState(deal, ['delivered'], 'Only what has been delivered can be accepted.');
  assertNotFrozen(deal);
  if ((deal.receipt ?? null) === null) {
    throw new ConflictError('illegal-transition', 'Weigh it and record the received mass first.');
  }
  const accepted = { act: 'accepted', actorKind: 'buyer', actorId: actor.id } as const;
  await moveDeal(deal, 'accepted', { ...accepted, changes: { acceptedAt: unit.now } }, unit);
  await settleDeal(deal, { actorKind: 'house' }, unit);
  await mailDealAccepted(deal, unit);
  return deal;
}
