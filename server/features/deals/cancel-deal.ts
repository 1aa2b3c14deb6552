import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { refundDeal } from '#server/features/payments/refund-deal.ts';
import type { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { mailDealCancelled } from './deal-mails.ts';
import { moveDeal, type DealAct } from './move-deal.ts';

/**
 * Ends a funded deal without a sale: cancelled, the lot closed, the refund in full ordered. The money leaves escrow when the
 * provider has taken the refund. `reason` is a sentence that both sides read.
 *
 * The caller holds the guard rows of lot and deal. Throws `illegal-transition`.
 */
export async function cancelDeal(
  deal: Deal,
  { reason, ...act }: DealAct & { reason: string },
  unit: Unit,
): Promise<Deal> {
  await moveDeal(
    deal,
    'cancelled',
    { ...act, detail: { reason, ...act.detail }, changes: { endReason: reason } },
    unit,
  );
  const lot = await Lot.findByPk(deal.lotId, { transaction: unit.tx });
  invariant(lot !== null, 'a deal has its lot');
  await moveLot(
    lot,
    'closed',
    {
      act: 'deal-cancelled',
      actorKind: act.actorKind === 'desk' ? 'desk' : 'house',
      actorId: act.actorKind === 'desk' ? (act.actorId ?? null) : null,
      detail: { dealCode: deal.code },
      changes: { stateReason: reason },
    },
    unit,
  );
  await refundDeal({ deal, reason: act.act }, unit);
  await mailDealCancelled(deal, reason, unit);
  return deal;
}

export const NOT_SHIPPED_REASON = 'The seller did not ship in time.';

/**
 * Cancels a deal that was not shipped in time. The deadline is asked of the database's clock here, so that a late runner
 * never acts early; answers false where there is nothing to do any more.
 *
 * The caller holds the guard rows of lot and deal.
 */
export async function cancelUnshippedDeal(deal: Deal, unit: Unit): Promise<boolean> {
  const isOver = deal.shipBy !== null && deal.shipBy.getTime() <= unit.now.getTime();
  if (deal.state !== 'funded' || deal.frozenAt !== null || !isOver) return false;
  await cancelDeal(deal, { reason: NOT_SHIPPED_REASON, act: 'cancelled', actorKind: 'clock' }, unit);
  return true;
}
