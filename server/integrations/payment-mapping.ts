import type Stripe from 'stripe';
import { invariant } from '#server/app-error.ts';
import { PaymentProviderError } from './payment-errors.ts';
import type {
  AccountReading,
  BalanceReading,
  CheckoutReading,
  PaymentEvent,
  PayoutReading,
  RefundReading,
  TransferReading,
} from './payment-readings.ts';

/** The SDK counts in JS numbers; beyond what they hold exactly nothing is sent. */
export function toProviderAmount(minor: bigint): number {
  invariant(minor > 0n && minor <= BigInt(Number.MAX_SAFE_INTEGER), 'an amount is positive and exact');
  return Number.parseInt(minor.toString(), 10);
}

function minorOf(amount: number | null | undefined): bigint {
  if (typeof amount !== 'number' || !Number.isSafeInteger(amount)) {
    throw new PaymentProviderError('unavailable', 'unreadable-answer', 'An amount is not a whole number');
  }
  return BigInt(amount);
}

/** Fields that are an id until they are expanded. */
function idOf(value: string | { id: string } | null | undefined): string | null {
  if (value === null || value === undefined) return null;
  return typeof value === 'string' ? value : value.id;
}

function expanded<T extends { id: string }>(value: string | T | null | undefined): T | null {
  return typeof value === 'object' && value !== null ? value : null;
}

const SESSION_STATUSES = ['open', 'complete', 'expired'] as const;

export function checkoutReading(session: Stripe.Checkout.Session): CheckoutReading {
  const intent = expanded(session.payment_intent);
  const charge = expanded(intent?.latest_charge);
  const transaction = expanded(charge?.balance_transaction);
  const status = SESSION_STATUSES.find((known) => known === session.status);
  if (status === undefined) {
    throw new PaymentProviderError('unavailable', 'unreadable-answer', 'The session has no known status');
  }
  return {
    sessionId: session.id,
    status,
    isPaid: status === 'complete' && session.payment_status === 'paid',
    url: session.url,
    dealId: session.metadata?.['deal_id'] ?? null,
    amountMinor: minorOf(session.amount_total),
    currency: (session.currency ?? '').toUpperCase(),
    paymentIntentId: idOf(session.payment_intent),
    chargeId: charge?.id ?? null,
    balanceTransactionId: transaction?.id ?? null,
    feeMinor: transaction === null ? null : minorOf(transaction.fee),
  };
}

export function refundReading(refund: Stripe.Refund): RefundReading {
  return {
    refundId: refund.id,
    status: (refund.status ?? 'pending') as RefundReading['status'],
    amountMinor: minorOf(refund.amount),
    failureReason: refund.failure_reason ?? null,
  };
}

export function transferReading(transfer: Stripe.Transfer): TransferReading {
  return {
    transferId: transfer.id,
    accountId: idOf(transfer.destination) ?? '',
    amountMinor: minorOf(transfer.amount),
  };
}

export function payoutReading(payout: Stripe.Payout): PayoutReading {
  return {
    payoutId: payout.id,
    status: payout.status as PayoutReading['status'],
    amountMinor: minorOf(payout.amount),
    failureCode: payout.failure_code,
    taskKey: payout.metadata?.['task_key'] ?? null,
  };
}

export function accountReading(account: Stripe.Account): AccountReading {
  return {
    accountId: account.id,
    detailsSubmitted: account.details_submitted === true,
    transfersActive: account.capabilities?.transfers === 'active',
    payoutsEnabled: account.payouts_enabled === true,
    requirements: [...(account.requirements?.currently_due ?? [])],
  };
}

function sumOf(funds: readonly Stripe.Balance.Available[] | readonly Stripe.Balance.Pending[]): bigint {
  return funds
    .filter(({ currency }) => currency === 'usd')
    .reduce((sum, { amount }) => sum + minorOf(amount), 0n);
}

export function balanceReading(balance: Stripe.Balance): BalanceReading {
  return { availableMinor: sumOf(balance.available), pendingMinor: sumOf(balance.pending) };
}

export function eventReading(event: Stripe.Event): PaymentEvent {
  const object = event.data.object as unknown as Record<string, unknown>;
  return {
    id: event.id,
    type: event.type,
    accountId: event.account ?? null,
    createdAt: new Date(event.created * 1000),
    objectId: typeof object['id'] === 'string' ? object['id'] : '',
    object,
  };
}
