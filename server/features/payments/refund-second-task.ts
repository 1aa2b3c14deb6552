import { invariant } from '#server/app-error.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { RefundReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import type { ProviderTask } from '#server/models/provider-task.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';
import type { SecondPayment } from './return-second-payment.ts';

const GONE: readonly RefundReading['status'][] = ['failed', 'canceled'];

function orderOf(task: ProviderTask): { paymentIntentId: string; amountMinor: bigint } {
  const { paymentIntentId, amountMinor } = task.payload as unknown as SecondPayment;
  return { paymentIntentId, amountMinor: BigInt(amountMinor) };
}

/** Sends a second payment back the way it came. The house bears the provider's fee. */
export const refundSecondTask = defineProviderTask<RefundReading>({
  async effect(task, { key, isRepeat }) {
    const { paymentIntentId, amountMinor } = orderOf(task);
    if (isRepeat) {
      const sent = await paymentClient().listRefunds(paymentIntentId);
      const found = sent.find(
        (refund) => refund.amountMinor === amountMinor && !GONE.includes(refund.status),
      );
      if (found !== undefined) return found;
    }
    return paymentClient().createRefund({ paymentIntentId, amountMinor, idempotencyKey: key });
  },
  async finish(task, reading, unit) {
    const deal = await Deal.findByPk(task.dealId, { transaction: unit.tx });
    invariant(deal !== null, 'a task has its deal');
    const { amountMinor } = orderOf(task);
    await postJournal(
      {
        kind: 'refund',
        dealId: null,
        uniqueKey: `refund:${reading.refundId}`,
        memo: `Refund of the second payment of deal ${deal.code}`,
        providerObjectId: reading.refundId,
        entries: [
          { account: { kind: 'member_payable', memberId: deal.buyerId }, amountMinor },
          { account: { kind: 'provider' }, amountMinor: -amountMinor },
        ],
      },
      unit,
    );
    await recordDealEvent(deal, { act: 'second-refunded', actorKind: 'provider' }, unit);
    return reading.refundId;
  },
});
