import type { ContestRequest } from '#shared/schemas/deals.ts';
import { ConflictError, InvalidError } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { mailDealContested } from './deal-mails.ts';
import { isOverdueOrLost } from './deal-policy.ts';
import { moveDeal } from './move-deal.ts';
import { assertNotFrozen, assertState, readDealFor } from './read-own-deal.ts';

function assertReasonFits(deal: Deal, reason: ContestRequest['reason'], now: Date): void {
  const isArrival = reason === 'not_arrived';
  if (isArrival !== (deal.state === 'shipped')) {
    const message = isArrival
      ? 'It has been delivered; say what is wrong with it'
      : 'It has not been delivered yet; only “not arrived” can be said of it';
    throw new InvalidError([{ pointer: '/reason', code: 'reason-does-not-fit', message }]);
  }
  if (isArrival && !isOverdueOrLost(deal, now)) {
    throw new ConflictError(
      'illegal-transition',
      `A parcel counts as not arrived from ${deal.arriveBy?.toISOString() ?? 'its deadline'} on, or when the carrier has lost it.`,
    );
  }
}

/**
 * The buyer contests, and the money stays where it is until the desk has ruled. *Not arrived* from the tenth day after
 * shipping or once the carrier has lost the parcel; everything else from the delivery on.
 *
 * Locks the deal. Throws `not-found`, `forbidden`, `deal-frozen`, `illegal-transition`, `invalid-input` at `/reason`.
 */
export async function contestDeal(
  input: ContestRequest & { dealId: string },
  unit: Unit,
  actor: Actor,
): Promise<Deal> {
  const { reason, note } = input;
  const deal = await readDealFor('buyer', input.dealId, unit, actor);
  assertState(deal, ['shipped', 'delivered'], 'A deal is contested after shipping and before accepting.');
  assertNotFrozen(deal);
  assertReasonFits(deal, reason, unit.now);
  await moveDeal(
    deal,
    'contested',
    {
      act: 'contested',
      actorKind: 'buyer',
      actorId: actor.id,
      detail: { reason, note },
      changes: { contestedAt: unit.now, contestReason: reason, contestNote: note },
    },
    unit,
  );
  await mailDealContested(deal, { reason, note }, unit);
  return deal;
}
