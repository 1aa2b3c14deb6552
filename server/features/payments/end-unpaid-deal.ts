import type { Unit } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { invariant } from '#server/app-error.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';
import { lapseDeal } from './lapse-deal.ts';

/**
 * The deadline to pay has passed: orders the end of the session where one could still be paid, else lapses the deal at
 * once. Locks: the lot and the deal are held by the caller.
 *
 * Throws as `lapseDeal`.
 */
export async function endUnpaidDeal(
  { dealId }: { dealId: string },
  unit: Unit,
): Promise<'expiring' | 'lapsed'> {
  const deal = await Deal.findByPk(dealId, { transaction: unit.tx });
  invariant(deal !== null, 'the deal was found before');
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  const isPayable = payment !== null && (payment.state === 'starting' || payment.state === 'open');
  if (deal.state !== 'agreed' || !isPayable) {
    await lapseDeal({ dealId }, unit);
    return 'lapsed';
  }
  await enqueueProviderTask(
    {
      dealId,
      kind: 'expire_session',
      payload: { attempt: payment.attempt },
      idempotencyKey: `expire:${deal.code}:v${payment.attempt}`,
    },
    unit,
  );
  return 'expiring';
}
