/** What the provider says of a checkout session, in our words. Sums are minor units. */
export type CheckoutReading = {
  sessionId: string;
  status: 'open' | 'complete' | 'expired';
  isPaid: boolean;
  url: string | null;
  dealId: string | null;
  amountMinor: bigint;
  currency: string;
  paymentIntentId: string | null;
  chargeId: string | null;
  balanceTransactionId: string | null;
  /** Null until the provider has booked the charge. */
  feeMinor: bigint | null;
};

export type AccountReading = {
  accountId: string;
  detailsSubmitted: boolean;
  transfersActive: boolean;
  payoutsEnabled: boolean;
  requirements: string[];
};

export type RefundReading = {
  refundId: string;
  status: 'pending' | 'requires_action' | 'succeeded' | 'failed' | 'canceled';
  amountMinor: bigint;
  failureReason: string | null;
};

export type TransferReading = { transferId: string; accountId: string; amountMinor: bigint };

export type PayoutReading = {
  payoutId: string;
  status: 'pending' | 'in_transit' | 'paid' | 'failed' | 'canceled';
  amountMinor: bigint;
  failureCode: string | null;
  taskKey: string | null;
};

/** Of one currency (US dollars): what can be used now, and what is on its way. */
export type BalanceReading = { availableMinor: bigint; pendingMinor: bigint };

/** A signed message of the provider. `object` is as it came; whoever acts on it reads the object again. */
export type PaymentEvent = {
  id: string;
  type: string;
  accountId: string | null;
  createdAt: Date;
  objectId: string;
  object: Record<string, unknown>;
};
