import { invariant } from '#server/app-error.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import type { TransferReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { Payout } from '#server/models/payout.ts';
import { sendPayout } from './send-payout.ts';

/** From our balance to the seller's account, naming the buyer's charge as the source; the payout follows. */
export const transferTask = defineProviderTask<TransferReading>({
  async effect(task, { key, isRepeat }) {
    const deal = await Deal.findByPk(task.dealId);
    const payment = await Payment.findOne({ where: { dealId: task.dealId } });
    const payout = await Payout.findOne({ where: { dealId: task.dealId } });
    invariant(deal !== null && payout !== null, 'a released deal has its payout');
    invariant(payment !== null && payment.chargeId !== null, 'a released deal was paid');
    const { providerAccountId: accountId, amountMinor } = payout;
    if (isRepeat) {
      const sent = await paymentClient().listTransfers(deal.code);
      const found = sent.find((row) => row.accountId === accountId && row.amountMinor === amountMinor);
      if (found !== undefined) return found;
    }
    return paymentClient().createTransfer({
      dealCode: deal.code,
      chargeId: payment.chargeId,
      accountId,
      amountMinor,
      idempotencyKey: key,
    });
  },
  async finish(task, reading, unit) {
    const { tx } = unit;
    const deal = await Deal.findByPk(task.dealId, { transaction: tx });
    const payout = await Payout.findOne({ where: { dealId: task.dealId }, transaction: tx });
    invariant(deal !== null && payout !== null, 'a released deal has its payout');
    invariant(payout.state === 'due', 'a payout is transferred once');
    await payout.update(
      { state: 'transferred', providerTransferId: reading.transferId },
      { transaction: tx },
    );
    await postJournal(
      {
        kind: 'transfer',
        dealId: deal.id,
        uniqueKey: `transfer:${reading.transferId}`,
        memo: `Transfer of deal ${deal.code}`,
        providerObjectId: reading.transferId,
        entries: [
          {
            account: { kind: 'member_connected', memberId: payout.memberId },
            amountMinor: payout.amountMinor,
          },
          { account: { kind: 'provider' }, amountMinor: -payout.amountMinor },
        ],
      },
      unit,
    );
    await recordDealEvent(deal, { act: 'transfer-sent', actorKind: 'house' }, unit);
    await sendPayout({ deal, payout }, unit);
    return reading.transferId;
  },
});
