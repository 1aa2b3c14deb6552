import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { deliverDeal } from './deliver-deal.ts';
import { assertNotFrozen, assertState, readDealFor } from './read-own-deal.ts';

/**
 * The buyer confirms what the carrier delivered without a signature; only that makes it count as delivered.
 *
 * Locks the deal. Throws `not-found`, `forbidden`, `deal-frozen`, `illegal-transition`.
 */
export async function confirmDelivery(dealId: string, unit: Unit, actor: Actor): Promise<Deal> {
  const deal = await readDealFor('buyer', dealId, unit, actor);
  assertState(deal, ['shipped']);
  assertNotFrozen(deal);
  const parcel = deal.parcel ?? null;
  if (parcel === null || parcel.deliveredAt === null || parcel.isSigned !== false) {
    throw new ConflictError(
      'illegal-transition',
      'The carrier has not reported a delivery without signature.',
    );
  }
  return deliverDeal(
    deal,
    {
      act: 'delivery-confirmed',
      actorKind: 'buyer',
      actorId: actor.id,
      deliveredAt: parcel.deliveredAt,
      signedBy: null,
    },
    unit,
  );
}
