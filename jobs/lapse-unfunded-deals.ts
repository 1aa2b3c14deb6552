import { withTransaction } from '#server/database/transaction.ts';
import { locksOf } from '#server/features/payments/deal-locks.ts';
import { endUnpaidDeal } from '#server/features/payments/end-unpaid-deal.ts';
import { unpaidDealsPast } from '#server/features/payments/payment-queries.ts';
import { PAYMENT_TASK_HANDLERS } from '#server/features/payments/payment-task-handlers.ts';
import { AppError } from '#server/app-error.ts';
import { defineJob } from './run-job.ts';
import { runProviderTasks } from './run-provider-tasks.ts';

/** Deals not paid in time: the session is ended at the provider first, then the deal lapses, or turns out to be paid. */
export const lapseUnfundedDealsJob = defineJob({
  name: 'lapse-unfunded-deals',
  everySeconds: 15,
  async run({ now, log }) {
    const counts = { lapsed: 0, expiring: 0, left: 0 };
    const expiring: string[] = [];
    for (const deal of await unpaidDealsPast(now)) {
      try {
        const step = await withTransaction(locksOf(deal), (unit) => endUnpaidDeal({ dealId: deal.id }, unit));
        counts[step] += 1;
        if (step === 'expiring') expiring.push(deal.id);
      } catch (error) {
        // Paid or frozen since it was chosen: no longer ours to lapse.
        if (!(error instanceof AppError)) throw error;
        log.info({ deal: deal.code, code: error.code }, 'not lapsed');
        counts.left += 1;
      }
    }
    const { expire_session } = PAYMENT_TASK_HANDLERS;
    if (expiring.length > 0) await runProviderTasks({ expire_session }, { dealIds: expiring });
    return counts;
  },
});
