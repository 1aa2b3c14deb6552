import { withTransaction } from '#server/database/transaction.ts';
import { cancelUnshippedDeal } from '#server/features/deals/cancel-deal.ts';
import { findUnshippedDeals, loadDeal } from '#server/features/deals/deal-queries.ts';
import { defineJob, type JobContext } from './run-job.ts';

/** Cancels what was not shipped in time, each deal in its own transaction; the command asks the deadline again. */
export async function cancelUnshippedDeals({
  now,
}: Pick<JobContext, 'now'>): Promise<Record<string, unknown>> {
  let cancelled = 0;
  for (const { id, lotId } of await findUnshippedDeals(now)) {
    const isDone = await withTransaction({ lots: [lotId], deals: [id] }, async (unit) =>
      cancelUnshippedDeal(await loadDeal(id, unit.tx), unit),
    );
    if (isDone) cancelled += 1;
  }
  return { cancelled };
}

export const cancelUnshippedDealsJob = defineJob({
  name: 'cancel-unshipped-deals',
  everySeconds: 60,
  run: cancelUnshippedDeals,
});
