import { ConflictError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { heldMinor } from '#server/features/ledger/ledger-queries.ts';
import type { Deal } from '#server/models/deal.ts';
import { Refund } from '#server/models/refund.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';

/**
 * Orders the refund of all that is held for a deal; the job sends it and books it when the provider took it. A deal has one
 * refund: ordered again, the first is answered. Locks: the deal is held by the caller.
 *
 * Throws `deal-not-funded` when nothing is held.
 */
export async function refundDeal(
  { deal, reason }: { deal: Deal; reason: string },
  unit: Unit,
): Promise<Refund> {
  const known = await Refund.findOne({ where: { dealId: deal.id }, transaction: unit.tx });
  if (known !== null) return known;
  const amountMinor = await heldMinor(deal.id, unit.tx);
  if (amountMinor <= 0n) throw new ConflictError('deal-not-funded');
  const refund = await Refund.create(
    { id: newId(), dealId: deal.id, amountMinor, state: 'due', reason: reason.slice(0, 60) },
    { transaction: unit.tx },
  );
  await enqueueProviderTask(
    { dealId: deal.id, kind: 'refund', payload: {}, idempotencyKey: `refund:${deal.code}:v1` },
    unit,
  );
  return refund;
}
