import { ConflictError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { assertState, readDealFor } from '#server/features/deals/read-own-deal.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';

/**
 * Reads a deal whose buyer may record what arrived: delivered, and nothing recorded yet.
 * Throws `not-found`, `forbidden`, `illegal-transition`.
 */
export async function readDealToReceive(dealId: string, unit: Unit, actor: Actor): Promise<Deal> {
  const deal = await readDealFor('buyer', dealId, unit, actor);
  assertState(
    deal,
    ['delivered'],
    'The mass is recorded after the delivery and before accepting or contesting.',
  );
  if ((deal.receipt ?? null) !== null)
    throw new ConflictError('illegal-transition', 'The received mass is recorded already.');
  return deal;
}
