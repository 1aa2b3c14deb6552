import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { reverseJournal } from '#server/features/ledger/reverse-journal.ts';
import type { RefundReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Refund } from '#server/models/refund.ts';

/**
 * Brings a refund in line with what the provider says of it now. One that came back is booked back into escrow and told to
 * the admins: the buyer's money is held again, and a person finds the way. Answers whether anything changed. Locks: the
 * deal is held by the caller.
 */
export async function applyRefund({ reading }: { reading: RefundReading }, unit: Unit): Promise<boolean> {
  const refund = await Refund.findOne({
    where: { providerRefundId: reading.refundId },
    transaction: unit.tx,
  });
  if (refund === null || refund.state === 'due' || refund.state === 'failed') return false;
  if (reading.status === 'succeeded') {
    if (refund.state === 'succeeded') return false;
    await refund.update({ state: 'succeeded' }, { transaction: unit.tx });
    return true;
  }
  if (reading.status !== 'failed' && reading.status !== 'canceled') return false;
  const deal = await Deal.findByPk(refund.dealId, { transaction: unit.tx });
  invariant(deal !== null, 'a refund has its deal');
  await refund.update({ state: 'failed' }, { transaction: unit.tx });
  await reverseJournal(
    { uniqueKey: `refund:${reading.refundId}`, memo: `The refund of deal ${deal.code} came back` },
    unit,
  );
  await recordDealEvent(deal, { act: 'refund-failed', actorKind: 'provider' }, unit);
  await recordAudit(
    {
      actor: null,
      act: 'note-failed-refund',
      subjectKind: 'deal',
      subjectId: deal.code,
      detail: { refundId: reading.refundId, reason: reading.failureReason },
    },
    unit,
  );
  return true;
}
