import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';
import { Payout } from '#server/models/payout.ts';
import { sendPayout } from './send-payout.ts';

/**
 * Sends a failed payout anew, under the next number. Does nothing for one that has not failed. Locks: the deal is held by
 * the caller.
 */
export async function retryPayout({ dealId }: { dealId: string }, unit: Unit): Promise<boolean> {
  const deal = await Deal.findByPk(dealId, { transaction: unit.tx });
  const payout = await Payout.findOne({ where: { dealId }, transaction: unit.tx });
  invariant(deal !== null && payout !== null, 'a payout has its deal');
  if (payout.state !== 'failed') return false;
  await payout.update(
    { state: 'transferred', providerPayoutId: null, attempt: payout.attempt + 1 },
    { transaction: unit.tx },
  );
  await sendPayout({ deal, payout }, unit);
  return true;
}
