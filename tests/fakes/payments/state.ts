import type Stripe from 'stripe';

/** Every kind of object the fake keeps, by the value of its `object` field. */
export interface Kinds {
  account: Stripe.Account;
  balance_transaction: Stripe.BalanceTransaction;
  bank_account: Stripe.BankAccount;
  charge: Stripe.Charge;
  'checkout.session': Stripe.Checkout.Session;
  dispute: Stripe.Dispute;
  event: Stripe.Event;
  payment_intent: Stripe.PaymentIntent;
  payout: Stripe.Payout;
  refund: Stripe.Refund;
  transfer: Stripe.Transfer;
  transfer_reversal: Stripe.TransferReversal;
}
export type Kind = keyof Kinds;

/** `owner` is `platform` or the id of a connected account. */
export interface StoredObject {
  owner: string;
  value: Kinds[Kind];
}

/** What a checkout session remembers beside its public fields; `expiresAt` is on the fake's own clock. */
export interface SessionDetails {
  items: Stripe.LineItem[];
  expiresAt: number;
  transferGroup: string | null;
  intentMetadata: Stripe.Metadata;
  description: string | null;
}

export interface Leg {
  account: string;
  amount: number;
}

export interface Journal {
  id: string;
  at: number;
  memo: string;
  source: string;
  currency: string;
  legs: [Leg, Leg];
}

export interface Delivery {
  attempts: number;
  nextAttemptAtMs: number;
  state: 'waiting' | 'held' | 'delivered' | 'dropped' | 'given_up';
  copies: number;
  lastStatus: number | null;
}

export interface SavedAnswer {
  fingerprint: string;
  status: number;
  body: unknown;
  savedAt: number;
}

export interface AccountLinkRecord {
  account: string;
  expiresAt: number;
  used: boolean;
  refreshUrl: string;
  returnUrl: string;
}

export interface PayoutPlan {
  inTransitAt: number;
  settlesAt: number;
  bankNumber: string;
}

export const webhookModes = ['normal', 'hold', 'drop', 'duplicate', 'shuffle', 'delay'] as const;
export type WebhookMode = (typeof webhookModes)[number];

export interface Settings {
  settlementDelaySeconds: number;
  payoutDelaySeconds: number;
  webhookMode: WebhookMode;
  webhookDelayMs: number;
}

export interface State {
  version: 1;
  clockOffsetSeconds: number;
  objects: Record<string, StoredObject>;
  sessionDetails: Record<string, SessionDetails>;
  journals: Journal[];
  deliveries: Record<string, Delivery>;
  answers: Record<string, SavedAnswer>;
  accountLinks: Record<string, AccountLinkRecord>;
  onboardingVisits: Record<string, string>;
  bankNumbers: Record<string, string>;
  payoutPlans: Record<string, PayoutPlan>;
  settings: Settings;
}

export function emptyState(settings: Settings): State {
  return {
    version: 1,
    clockOffsetSeconds: 0,
    objects: {},
    sessionDetails: {},
    journals: [],
    deliveries: {},
    answers: {},
    accountLinks: {},
    onboardingVisits: {},
    bankNumbers: {},
    payoutPlans: {},
    settings: { ...settings },
  };
}
