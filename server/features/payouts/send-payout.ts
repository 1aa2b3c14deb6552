import type { Unit } from '#server/database/transaction.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';
import type { Deal } from '#server/models/deal.ts';
import type { Payout } from '#server/models/payout.ts';

/** Orders the payout of what lies on the seller's account at the provider. Locks: the deal is held by the caller. */
export async function sendPayout(
  { deal, payout }: { deal: Deal; payout: Payout },
  unit: Unit,
): Promise<void> {
  await enqueueProviderTask(
    {
      dealId: deal.id,
      kind: 'payout',
      payload: { attempt: payout.attempt },
      idempotencyKey: `payout:${deal.code}:v${payout.attempt}`,
    },
    unit,
  );
}
