import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { mailDealRefunded } from '#server/features/deals/deal-mails.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { RefundReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { Refund } from '#server/models/refund.ts';
import { applyRefund } from './apply-refund.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';

const GONE: readonly RefundReading['status'][] = ['failed', 'canceled'];

async function bookRefund(refund: Refund, reading: RefundReading, unit: Unit): Promise<void> {
  const deal = await Deal.findByPk(refund.dealId, { transaction: unit.tx });
  invariant(deal !== null, 'a refund has its deal');
  await refund.update({ state: 'sent', providerRefundId: reading.refundId }, { transaction: unit.tx });
  await postJournal(
    {
      kind: 'refund',
      dealId: deal.id,
      uniqueKey: `refund:${reading.refundId}`,
      memo: `Refund of deal ${deal.code}`,
      providerObjectId: reading.refundId,
      entries: [
        { account: { kind: 'escrow', dealId: deal.id }, amountMinor: refund.amountMinor },
        { account: { kind: 'provider' }, amountMinor: -refund.amountMinor },
      ],
    },
    unit,
  );
  await recordDealEvent(deal, { act: 'refunded', actorKind: 'provider' }, unit);
  await mailDealRefunded(deal, unit);
}

/** Sends the buyer's money back the way it came. The house bears the provider's fee. */
export const refundTask = defineProviderTask<RefundReading>({
  async effect(task, { key, isRepeat }) {
    const payment = await Payment.findOne({ where: { dealId: task.dealId } });
    const refund = await Refund.findOne({ where: { dealId: task.dealId } });
    invariant(
      payment !== null && payment.paymentIntentId !== null && refund !== null,
      'there is what to refund',
    );
    if (isRepeat) {
      const sent = await paymentClient().listRefunds(payment.paymentIntentId);
      const found = sent.find(
        ({ amountMinor, status }) => amountMinor === refund.amountMinor && !GONE.includes(status),
      );
      if (found !== undefined) return found;
    }
    return paymentClient().createRefund({
      paymentIntentId: payment.paymentIntentId,
      amountMinor: refund.amountMinor,
      idempotencyKey: key,
    });
  },
  async finish(task, reading, unit) {
    const refund = await Refund.findOne({ where: { dealId: task.dealId }, transaction: unit.tx });
    invariant(refund !== null, 'a refund task has its refund');
    if (refund.state === 'due') await bookRefund(refund, reading, unit);
    await applyRefund({ reading }, unit);
    return reading.refundId;
  },
});
