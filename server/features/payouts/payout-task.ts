import { invariant } from '#server/app-error.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { PayoutReading } from '#server/integrations/payment-readings.ts';
import { Payout } from '#server/models/payout.ts';
import { applyPayout } from './apply-payout.ts';

/** From the seller's account at the provider to the bank: one manual payout a deal. */
export const payoutTask = defineProviderTask<PayoutReading>({
  async effect(task, { key, isRepeat }) {
    const payout = await Payout.findOne({ where: { dealId: task.dealId } });
    invariant(payout !== null, 'a payout task has its payout');
    const { providerAccountId: accountId, amountMinor } = payout;
    if (isRepeat) {
      const sent = await paymentClient().listPayouts(accountId);
      const found = sent.find(({ taskKey }) => taskKey === task.idempotencyKey);
      if (found !== undefined) return found;
    }
    return paymentClient().createPayout({
      accountId,
      amountMinor,
      taskKey: task.idempotencyKey,
      idempotencyKey: key,
    });
  },
  async finish(task, reading, unit) {
    await applyPayout({ dealId: task.dealId, reading }, unit);
    return reading.payoutId;
  },
});
