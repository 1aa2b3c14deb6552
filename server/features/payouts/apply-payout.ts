import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { mailPayoutFailed, mailPayoutSent } from '#server/features/deals/deal-mails.ts';
import { moveDeal, recordDealEvent } from '#server/features/deals/move-deal.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { reverseJournal } from '#server/features/ledger/reverse-journal.ts';
import type { PayoutReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Payout } from '#server/models/payout.ts';

type Found = { deal: Deal; payout: Payout };

async function applyPaid({ deal, payout }: Found, reading: PayoutReading, unit: Unit): Promise<boolean> {
  // A payout that failed stays failed, so a reading from before that is old news.
  if (payout.state !== 'sent') return false;
  await postJournal(
    {
      kind: 'payout',
      dealId: deal.id,
      uniqueKey: `payout:${reading.payoutId}`,
      memo: `Payout of deal ${deal.code}`,
      providerObjectId: reading.payoutId,
      entries: [
        {
          account: { kind: 'member_payable', memberId: payout.memberId },
          amountMinor: payout.amountMinor,
        },
        {
          account: { kind: 'member_connected', memberId: payout.memberId },
          amountMinor: -payout.amountMinor,
        },
      ],
    },
    unit,
  );
  await payout.update({ state: 'paid', paidAt: unit.now, failureCode: null }, { transaction: unit.tx });
  const changes = { paidOutAt: unit.now };
  await moveDeal(deal, 'paid_out', { act: 'paid-out', actorKind: 'provider', changes }, unit);
  await mailPayoutSent(deal, unit);
  return true;
}

/** The money is back on the seller's account at the provider; if it was booked as paid, that is taken back. */
async function applyFailed({ deal, payout }: Found, reading: PayoutReading, unit: Unit): Promise<boolean> {
  if (payout.state === 'failed') return false;
  const failureCode = reading.failureCode ?? reading.status;
  const event = { act: 'payout-failed', actorKind: 'provider', detail: { failureCode } } as const;
  if (payout.state === 'paid') {
    await reverseJournal(
      {
        uniqueKey: `payout:${reading.payoutId}`,
        kind: 'payout_returned',
        memo: `The payout of deal ${deal.code} came back`,
      },
      unit,
    );
    await moveDeal(deal, 'settled', { ...event, changes: { paidOutAt: null } }, unit);
  } else {
    await recordDealEvent(deal, event, unit);
  }
  await payout.update({ state: 'failed', failureCode, paidAt: null }, { transaction: unit.tx });
  await mailPayoutFailed(deal, { failureCode, occasion: reading.payoutId }, unit);
  return true;
}

/**
 * Brings a payout in line with what the provider says of it now; answers whether anything changed. A message may be here
 * before our own call has come back, so an unknown payout of the deal is taken on; one of an earlier attempt is left.
 * Locks: the lot and the deal are held by the caller.
 */
export async function applyPayout(
  { dealId, reading }: { dealId: string; reading: PayoutReading },
  unit: Unit,
): Promise<boolean> {
  const deal = await Deal.findByPk(dealId, { transaction: unit.tx });
  const payout = await Payout.findOne({ where: { dealId }, transaction: unit.tx });
  invariant(deal !== null && payout !== null, 'a payout has its deal');
  if (payout.state === 'due') return false;
  const isNew = payout.providerPayoutId === null;
  if (!isNew && payout.providerPayoutId !== reading.payoutId) return false;
  if (isNew) {
    if (reading.taskKey !== `payout:${deal.code}:v${payout.attempt}`) return false;
    await payout.update({ state: 'sent', providerPayoutId: reading.payoutId }, { transaction: unit.tx });
    await recordDealEvent(deal, { act: 'payout-sent', actorKind: 'house' }, unit);
  }
  const found = { deal, payout };
  if (reading.status === 'paid') return applyPaid(found, reading, unit);
  if (reading.status === 'failed' || reading.status === 'canceled') return applyFailed(found, reading, unit);
  return isNew;
}
