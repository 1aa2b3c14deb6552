import { withTransaction } from '#server/database/transaction.ts';
import { applyCheckout } from '#server/features/payments/apply-checkout.ts';
import { applyRefund } from '#server/features/payments/apply-refund.ts';
import { findDealLocks } from '#server/features/payments/deal-locks.ts';
import {
  failedPayoutsBefore,
  openPaymentsBefore,
  sentPayoutsBefore,
  sentRefundsBefore,
} from '#server/features/payments/payment-queries.ts';
import { applyPayout } from '#server/features/payouts/apply-payout.ts';
import { retryPayout } from '#server/features/payouts/retry-payout.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { Unit } from '#server/database/transaction.ts';
import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import { defineJob, type JobContext } from './run-job.ts';

/** A message normally comes within seconds; after this long we ask ourselves. */
const SILENCE_SECONDS = 60;
/** A payout that failed is tried again after a day, where the account can take one. */
const PAYOUT_RETRY_HOURS = 24;

type Step = { dealId: string; read: () => Promise<((unit: Unit) => Promise<boolean>) | null> };

async function stepsAt(now: Date): Promise<Step[]> {
  const provider = paymentClient();
  const silentSince = new Date(now.getTime() - SILENCE_SECONDS * 1000);
  const retryBefore = new Date(now.getTime() - PAYOUT_RETRY_HOURS * 3_600_000);
  const payments = await openPaymentsBefore(silentSince);
  const payouts = await sentPayoutsBefore(silentSince);
  const refunds = await sentRefundsBefore(silentSince);
  const failed = await failedPayoutsBefore(retryBefore);
  return [
    ...payments.map(({ dealId, providerSessionId }) => ({
      dealId,
      read: async () => {
        if (providerSessionId === null) return null;
        const reading = await provider.readCheckout(providerSessionId);
        return async (unit: Unit) => (await applyCheckout({ dealId, reading }, unit)) !== 'unchanged';
      },
    })),
    ...payouts.map(({ dealId, providerPayoutId, providerAccountId }) => ({
      dealId,
      read: async () => {
        if (providerPayoutId === null) return null;
        const reading = await provider.readPayout(providerPayoutId, providerAccountId);
        return (unit: Unit) => applyPayout({ dealId, reading }, unit);
      },
    })),
    ...refunds.map(({ dealId, providerRefundId }) => ({
      dealId,
      read: async () => {
        if (providerRefundId === null) return null;
        const reading = await provider.readRefund(providerRefundId);
        return (unit: Unit) => applyRefund({ reading }, unit);
      },
    })),
    ...failed.map(({ dealId, providerAccountId }) => ({
      dealId,
      read: async () => {
        const { payoutsEnabled } = await provider.readAccount(providerAccountId);
        return payoutsEnabled ? (unit: Unit) => retryPayout({ dealId }, unit) : null;
      },
    })),
  ];
}

async function reconcile(step: Step, log: JobContext['log']): Promise<'changed' | 'same' | 'unanswered'> {
  try {
    const apply = await step.read();
    const locks = await findDealLocks(step.dealId);
    if (apply === null || locks === null) return 'same';
    return (await withTransaction(locks, apply)) ? 'changed' : 'same';
  } catch (error) {
    if (!(error instanceof PaymentProviderError)) throw error;
    log.warn({ err: error, dealId: step.dealId }, 'not reconciled');
    return 'unanswered';
  }
}

/** Where messages were lost, late or dropped: asks the provider how each open thing stands, and applies it as a message would. */
export const reconcilePaymentsJob = defineJob({
  name: 'reconcile-payments',
  everySeconds: 60,
  async run({ now, log }) {
    const counts = { changed: 0, same: 0, unanswered: 0 };
    for (const step of await stepsAt(now)) counts[await reconcile(step, log)] += 1;
    return counts;
  },
});
