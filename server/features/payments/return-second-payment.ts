import { minorToAmount } from '#shared/money.ts';
import { invariant } from '#server/app-error.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { mailSecondPayment } from '#server/features/deals/deal-mails.ts';
import { recordDealEvent } from '#server/features/deals/move-deal.ts';
import { openMemberAccounts } from '#server/features/ledger/open-accounts.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import type { Deal } from '#server/models/deal.ts';
import { ProviderTask } from '#server/models/provider-task.ts';
import { enqueueProviderTask } from '#server/features/provider-tasks/enqueue-provider-task.ts';
import type { PaidCheckout } from './paid-checkout.ts';

/** What the task that sends it back needs to know. */
export type SecondPayment = { paymentIntentId: string; chargeId: string; amountMinor: string };

/** Owed to the buyer, never held for the deal: escrow keeps to the one sum that was agreed. */
async function book(deal: Deal, checkout: PaidCheckout, unit: Unit): Promise<void> {
  await openMemberAccounts(deal.buyerId, unit);
  await postJournal(
    {
      kind: 'funding',
      dealId: null,
      uniqueKey: `funding:${checkout.chargeId}`,
      memo: `Second payment of deal ${deal.code}, owed to its buyer`,
      providerObjectId: checkout.chargeId,
      entries: [
        { account: { kind: 'provider' }, amountMinor: checkout.amountMinor },
        { account: { kind: 'member_payable', memberId: deal.buyerId }, amountMinor: -checkout.amountMinor },
      ],
    },
    unit,
  );
  if (checkout.feeMinor <= 0n) return;
  await postJournal(
    {
      kind: 'provider_fee',
      dealId: null,
      uniqueKey: `provider_fee:${checkout.chargeId}`,
      memo: `The provider's fee on the second payment of deal ${deal.code}`,
      providerObjectId: checkout.balanceTransactionId,
      entries: [
        { account: { kind: 'provider_fees' }, amountMinor: checkout.feeMinor },
        { account: { kind: 'provider' }, amountMinor: -checkout.feeMinor },
      ],
    },
    unit,
  );
}

/**
 * Takes a second payment of a deal that has been paid before: books it as owed to the buyer, orders its refund in full,
 * writes it into the deal's register and the audit trail and tells the buyer. The deal and what is held for it stay as they
 * are. May be called any number of times for one charge; false when it was taken before. Locks: the deal is held by the
 * caller.
 */
export async function returnSecondPayment(
  { deal, checkout }: { deal: Deal; checkout: PaidCheckout },
  unit: Unit,
): Promise<boolean> {
  invariant(checkout.currency === 'USD', 'the books are in US dollars');
  const idempotencyKey = `refund:${checkout.chargeId}:v1`;
  const known = await ProviderTask.count({ where: { idempotencyKey }, transaction: unit.tx });
  if (known > 0) return false;
  await book(deal, checkout, unit);
  const amountMinor = checkout.amountMinor.toString();
  const payload: SecondPayment = {
    paymentIntentId: checkout.paymentIntentId,
    chargeId: checkout.chargeId,
    amountMinor,
  };
  await enqueueProviderTask({ dealId: deal.id, kind: 'refund_second', payload, idempotencyKey }, unit);
  await recordDealEvent(deal, { act: 'second-payment', actorKind: 'provider' }, unit);
  await recordAudit(
    {
      actor: null,
      act: 'return-second-payment',
      subjectKind: 'deal',
      subjectId: deal.code,
      detail: { chargeId: checkout.chargeId, amount: minorToAmount(checkout.amountMinor) },
    },
    unit,
  );
  await mailSecondPayment(deal, checkout, unit);
  return true;
}
