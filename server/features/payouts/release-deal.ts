import { ConflictError, invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';
import type { Deal } from '#server/models/deal.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { Payout } from '#server/models/payout.ts';

/**
 * Sends a settled deal's money on its way to the seller: the one payout row of the deal and the order to transfer. To be
 * called after the settlement has been booked, in the same transaction. A deal is released once; again, the first is
 * answered. Locks: the deal is held by the caller.
 *
 * Throws `payout-account-not-ready` when the seller has no account at the provider.
 */
export async function releaseDeal(
  { deal, amountMinor }: { deal: Deal; amountMinor: bigint },
  unit: Unit,
): Promise<Payout> {
  invariant(amountMinor > 0n, 'there is something to release');
  const known = await Payout.findOne({ where: { dealId: deal.id }, transaction: unit.tx });
  if (known !== null) return known;
  const account = await PayoutAccount.findOne({
    where: { memberId: deal.sellerId },
    transaction: unit.tx,
  });
  if (account === null || account.providerAccountId === null) {
    throw new ConflictError('payout-account-not-ready');
  }
  const payout = await Payout.create(
    {
      id: newId(),
      dealId: deal.id,
      memberId: deal.sellerId,
      providerAccountId: account.providerAccountId,
      amountMinor,
      state: 'due',
    },
    { transaction: unit.tx },
  );
  await enqueueProviderTask(
    { dealId: deal.id, kind: 'transfer', payload: {}, idempotencyKey: `transfer:${deal.code}:v1` },
    unit,
  );
  return payout;
}
