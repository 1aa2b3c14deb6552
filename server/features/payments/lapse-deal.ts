import { ConflictError, invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { mailDealLapsed } from '#server/features/deals/deal-mails.ts';
import { moveDeal } from '#server/features/deals/move-deal.ts';
import { isSellerSuspended, SUSPENDED_NOTE } from '#server/features/lots/pause-lots-of.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { Payment } from '#server/models/payment.ts';

/**
 * Ends a deal that was not paid in time and puts its lot back to open, or to paused while its seller is suspended. Its session must have been expired at the provider
 * first, so that nobody can pay for what is no longer his. Locks: the lot and the deal are held by the caller.
 *
 * Throws `illegal-transition` when the deal does not wait for its money, when its deadline has not passed, or while a
 * session can still be paid; `deal-frozen` while the desk has stopped the clocks.
 */
export async function lapseDeal({ dealId }: { dealId: string }, unit: Unit): Promise<void> {
  const deal = await Deal.findByPk(dealId, { transaction: unit.tx });
  invariant(deal !== null, 'the deal was found before');
  if (deal.state !== 'agreed') throw new ConflictError('illegal-transition', 'The deal is not unpaid.');
  if (unit.now < deal.fundBy) throw new ConflictError('illegal-transition', 'There is time left to pay.');
  if (deal.frozenAt !== null) throw new ConflictError('deal-frozen');
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  if (payment !== null && payment.state !== 'expired') {
    throw new ConflictError('illegal-transition', 'A payment can still come in.');
  }
  const lot = await Lot.findByPk(deal.lotId, { transaction: unit.tx });
  invariant(lot !== null, 'a deal has its lot');
  await moveLot(lot, 'open', { act: 'reopened', actorKind: 'house', actorId: null }, unit);
  if (await isSellerSuspended(lot, unit)) {
    const detail = { reason: SUSPENDED_NOTE };
    await moveLot(lot, 'paused', { act: 'paused', actorKind: 'house', actorId: null, detail }, unit);
  }
  await moveDeal(
    deal,
    'lapsed',
    { act: 'lapsed', actorKind: 'clock', actorId: null, changes: { endReason: 'Not paid in time' } },
    unit,
  );
  await mailDealLapsed(deal, unit);
}
