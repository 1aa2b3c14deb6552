import { minorToAmount } from '#shared/money.ts';
import { isDealEnded } from '#shared/deal-states.ts';
import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { shipByFrom } from '#server/features/deals/deadlines.ts';
import { mailDealFunded, mailLatePayment } from '#server/features/deals/deal-mails.ts';
import { moveDeal, recordDealEvent } from '#server/features/deals/move-deal.ts';
import { openDealAccounts } from '#server/features/ledger/open-accounts.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { moveLot } from '#server/features/lots/move-lot.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import { Payment } from '#server/models/payment.ts';
import type { PaidCheckout } from './paid-checkout.ts';
import { refundDeal } from './refund-deal.ts';
import { returnSecondPayment } from './return-second-payment.ts';

/**
 * `late`: the deal had ended, the money goes back. `second`: the deal was paid before, the second payment goes back.
 * `mismatch`: not what was ordered; nothing is booked, an admin is told.
 */
export type FundOutcome = 'funded' | 'already' | 'late' | 'second' | 'mismatch';

type Found = { deal: Deal; lot: Lot; payment: Payment };

async function find(dealId: string, { tx }: Unit): Promise<Found> {
  const deal = await Deal.findByPk(dealId, { transaction: tx });
  invariant(deal !== null, 'the deal was found before');
  const lot = await Lot.findByPk(deal.lotId, { transaction: tx });
  const payment = await Payment.findOne({ where: { dealId }, transaction: tx });
  invariant(lot !== null && payment !== null, 'a paid deal has a lot and a payment');
  return { deal, lot, payment };
}

async function tellMismatch({ deal, payment }: Found, checkout: PaidCheckout, unit: Unit): Promise<void> {
  await recordAudit(
    {
      actor: null,
      act: 'refuse-payment',
      subjectKind: 'deal',
      subjectId: deal.code,
      detail: {
        ordered: `USD ${minorToAmount(payment.amountMinor)}`,
        paid: `${checkout.currency} ${minorToAmount(checkout.amountMinor)}`,
        chargeId: checkout.chargeId,
        knownChargeId: payment.chargeId,
      },
    },
    unit,
  );
}

/** What came in, what the provider kept of it, and the payment row. */
async function book({ deal, payment }: Found, checkout: PaidCheckout, unit: Unit): Promise<void> {
  await openDealAccounts(deal.id, unit);
  await postJournal(
    {
      kind: 'funding',
      dealId: deal.id,
      uniqueKey: `funding:${checkout.chargeId}`,
      memo: `Payment of deal ${deal.code}`,
      providerObjectId: checkout.chargeId,
      entries: [
        { account: { kind: 'provider' }, amountMinor: checkout.amountMinor },
        { account: { kind: 'escrow', dealId: deal.id }, amountMinor: -checkout.amountMinor },
      ],
    },
    unit,
  );
  if (checkout.feeMinor > 0n) {
    await postJournal(
      {
        kind: 'provider_fee',
        dealId: deal.id,
        uniqueKey: `provider_fee:${checkout.chargeId}`,
        memo: `The provider's fee on deal ${deal.code}`,
        providerObjectId: checkout.balanceTransactionId,
        entries: [
          { account: { kind: 'provider_fees' }, amountMinor: checkout.feeMinor },
          { account: { kind: 'provider' }, amountMinor: -checkout.feeMinor },
        ],
      },
      unit,
    );
  }
  await payment.update(
    {
      state: 'paid',
      providerSessionId: checkout.sessionId,
      paymentIntentId: checkout.paymentIntentId,
      chargeId: checkout.chargeId,
      balanceTransactionId: checkout.balanceTransactionId,
      feeMinor: checkout.feeMinor,
      paidAt: unit.now,
    },
    { transaction: unit.tx },
  );
}

async function fund({ deal, lot }: Found, unit: Unit): Promise<void> {
  const seller = await Member.findByPk(deal.sellerId, { transaction: unit.tx });
  invariant(seller !== null, 'a deal has its seller');
  const shipBy = shipByFrom(unit.now, seller.timeZone);
  const by = { act: 'funded', actorKind: 'provider', actorId: null } as const;
  await moveLot(lot, 'sold', { act: 'sold', actorKind: 'house', actorId: null }, unit);
  await moveDeal(deal, 'funded', { ...by, changes: { fundedAt: unit.now, shipBy } }, unit);
  await mailDealFunded(deal, unit);
}

/** Money for a deal that has ended: nothing is given for it, so it goes back in full. */
async function sendBack({ deal }: Found, unit: Unit): Promise<void> {
  await recordDealEvent(deal, { act: 'late-payment', actorKind: 'provider' }, unit);
  await refundDeal({ deal, reason: 'late_payment' }, unit);
  await mailLatePayment(deal, unit);
}

/**
 * Takes a payment that the provider confirmed: books it and the provider's fee, sells the lot, moves the deal to funded and
 * orders both mails. May be called any number of times, by webhook and by re-reading alike: the second call changes
 * nothing. A payment for a deal that has ended is booked and refunded in full, and so is a second payment of a deal that
 * was paid before; one that is not what was ordered is not
 * booked. Locks: the lot and the deal are held by the caller; the escrow balance is locked here. Refuses nothing.
 */
export async function fundDeal(
  { dealId, checkout }: { dealId: string; checkout: PaidCheckout },
  unit: Unit,
): Promise<FundOutcome> {
  const found = await find(dealId, unit);
  const { deal, payment } = found;
  if (payment.state === 'paid') {
    if (payment.chargeId === checkout.chargeId) return 'already';
    if (checkout.currency === 'USD') {
      return (await returnSecondPayment({ deal, checkout }, unit)) ? 'second' : 'already';
    }
  }
  const isOrdered =
    payment.state !== 'paid' &&
    checkout.currency === 'USD' &&
    checkout.amountMinor === payment.amountMinor &&
    payment.amountMinor === deal.totalMinor;
  if (!isOrdered) {
    await tellMismatch(found, checkout, unit);
    return 'mismatch';
  }
  await book(found, checkout, unit);
  if (deal.state === 'agreed') {
    await fund(found, unit);
    return 'funded';
  }
  invariant(isDealEnded(deal.state), 'an unpaid deal waits for its money or has ended');
  await sendBack(found, unit);
  return 'late';
}
