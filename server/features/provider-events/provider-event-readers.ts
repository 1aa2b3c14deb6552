import { readAccountEvent } from '#server/features/onboarding/account-events.ts';
import { readPayoutEvent } from '#server/features/payouts/payout-events.ts';
import {
  readCheckoutEvent,
  readDeclineEvent,
  readRefundEvent,
} from '#server/features/payments/payment-events.ts';
import type { ProviderEventReader } from './provider-event-reader.ts';

/** Messages that mean something to us. Any other type is answered and noted as ignored. */
export const PROVIDER_EVENT_READERS: Readonly<Record<string, ProviderEventReader>> = {
  'checkout.session.completed': readCheckoutEvent,
  'checkout.session.async_payment_succeeded': readCheckoutEvent,
  'checkout.session.expired': readCheckoutEvent,
  'payment_intent.payment_failed': readDeclineEvent,
  'refund.created': readRefundEvent,
  'refund.updated': readRefundEvent,
  'refund.failed': readRefundEvent,
  'account.updated': readAccountEvent,
  'payout.paid': readPayoutEvent,
  'payout.failed': readPayoutEvent,
  'payout.canceled': readPayoutEvent,
};
