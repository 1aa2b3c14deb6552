import Stripe from 'stripe';
import { toPaymentProviderError, PaymentProviderError } from './payment-errors.ts';
import {
  accountReading,
  balanceReading,
  checkoutReading,
  eventReading,
  payoutReading,
  refundReading,
  toProviderAmount,
  transferReading,
} from './payment-mapping.ts';
import type {
  AccountReading,
  BalanceReading,
  CheckoutReading,
  PaymentEvent,
  PayoutReading,
  RefundReading,
  TransferReading,
} from './payment-readings.ts';

export type PaymentConfiguration = {
  secretKey: string;
  webhookSecret: string;
  apiBase: string;
  timeoutMs?: number;
};

export type CheckoutOrder = {
  dealId: string;
  dealCode: string;
  description: string;
  amountMinor: bigint;
  expiresAt: Date;
  successUrl: string;
  cancelUrl: string;
  idempotencyKey: string;
};

/** The longest that one attempt may take; with the SDK's two retries a call ends within half a minute. */
const TIMEOUT_MS = 8_000;
const RETRIES_MAX = 2;
/** Signatures older than the SDK's tolerance are refused by it; those from the future by us, but for a little skew. */
const SIGNATURE_SECONDS_MAX = 300;
const FUTURE_SECONDS_MAX = 60;
const LIST_LIMIT = 100;

function connect({ secretKey, apiBase, timeoutMs = TIMEOUT_MS }: PaymentConfiguration): Stripe {
  const limits = { telemetry: false, timeout: timeoutMs, maxNetworkRetries: RETRIES_MAX };
  if (apiBase === '') return new Stripe(secretKey, limits);
  const base = new URL(apiBase);
  const protocol = base.protocol === 'http:' ? 'http' : 'https';
  const port = base.port === '' ? (protocol === 'http' ? 80 : 443) : base.port;
  return new Stripe(secretKey, { ...limits, host: base.hostname, port, protocol });
}

async function ask<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    throw toPaymentProviderError(error);
  }
}

function refuseFutureSignature(header: string): void {
  const stamp = /(?:^|,)\s*t=(\d{1,12})(?:,|$)/.exec(header)?.[1];
  const seconds = stamp === undefined ? 0 : Number.parseInt(stamp, 10);
  if (seconds > Math.floor(Date.now() / 1000) + FUTURE_SECONDS_MAX) {
    throw new PaymentProviderError('refused', 'signature-from-the-future', 'The signature is dated ahead');
  }
}

const EXPANDED = ['payment_intent.latest_charge.balance_transaction'];

/** The hosted checkout page. */
function checkoutCalls(stripe: Stripe) {
  return {
    createCheckout: (order: CheckoutOrder): Promise<CheckoutReading> =>
      ask(async () => {
        const metadata = { deal_id: order.dealId, deal_code: order.dealCode };
        const session = await stripe.checkout.sessions.create(
          {
            mode: 'payment',
            allowed_payment_method_types: ['card'],
            client_reference_id: order.dealId,
            success_url: order.successUrl,
            cancel_url: order.cancelUrl,
            expires_at: Math.floor(order.expiresAt.getTime() / 1000),
            line_items: [
              {
                quantity: 1,
                price_data: {
                  currency: 'usd',
                  unit_amount: toProviderAmount(order.amountMinor),
                  product_data: { name: order.description },
                },
              },
            ],
            metadata,
            payment_intent_data: { transfer_group: order.dealCode, metadata },
          },
          { idempotencyKey: order.idempotencyKey },
        );
        return checkoutReading(session);
      }),
    readCheckout: (sessionId: string): Promise<CheckoutReading> =>
      ask(async () =>
        checkoutReading(await stripe.checkout.sessions.retrieve(sessionId, { expand: EXPANDED })),
      ),
    expireCheckout: (sessionId: string, idempotencyKey: string): Promise<CheckoutReading> =>
      ask(async () =>
        checkoutReading(await stripe.checkout.sessions.expire(sessionId, {}, { idempotencyKey })),
      ),
  };
}

/** Money back to the buyer, and on to the seller's account. */
function moneyCalls(stripe: Stripe) {
  return {
    createRefund: (order: {
      paymentIntentId: string;
      amountMinor: bigint;
      idempotencyKey: string;
    }): Promise<RefundReading> =>
      ask(async () =>
        refundReading(
          await stripe.refunds.create(
            { payment_intent: order.paymentIntentId, amount: toProviderAmount(order.amountMinor) },
            { idempotencyKey: order.idempotencyKey },
          ),
        ),
      ),
    listRefunds: (paymentIntentId: string): Promise<RefundReading[]> =>
      ask(async () => {
        const page = await stripe.refunds.list({ payment_intent: paymentIntentId, limit: LIST_LIMIT });
        return page.data.map(refundReading);
      }),
    readRefund: (refundId: string): Promise<RefundReading> =>
      ask(async () => refundReading(await stripe.refunds.retrieve(refundId))),
    createTransfer: (order: {
      dealCode: string;
      chargeId: string;
      accountId: string;
      amountMinor: bigint;
      idempotencyKey: string;
    }): Promise<TransferReading> =>
      ask(async () =>
        transferReading(
          await stripe.transfers.create(
            {
              amount: toProviderAmount(order.amountMinor),
              currency: 'usd',
              destination: order.accountId,
              source_transaction: order.chargeId,
              transfer_group: order.dealCode,
            },
            { idempotencyKey: order.idempotencyKey },
          ),
        ),
      ),
    listTransfers: (dealCode: string): Promise<TransferReading[]> =>
      ask(async () => {
        const page = await stripe.transfers.list({ transfer_group: dealCode, limit: LIST_LIMIT });
        return page.data.map(transferReading);
      }),
  };
}

/** From the seller's account to the bank. `taskKey` names the order, so that it is found again without its id. */
function payoutCalls(stripe: Stripe) {
  return {
    createPayout: (order: {
      accountId: string;
      taskKey: string;
      amountMinor: bigint;
      idempotencyKey: string;
    }): Promise<PayoutReading> =>
      ask(async () =>
        payoutReading(
          await stripe.payouts.create(
            {
              amount: toProviderAmount(order.amountMinor),
              currency: 'usd',
              metadata: { task_key: order.taskKey },
            },
            { stripeAccount: order.accountId, idempotencyKey: order.idempotencyKey },
          ),
        ),
      ),
    listPayouts: (accountId: string): Promise<PayoutReading[]> =>
      ask(async () => {
        const page = await stripe.payouts.list({ limit: LIST_LIMIT }, { stripeAccount: accountId });
        return page.data.map(payoutReading);
      }),
    readPayout: (payoutId: string, accountId: string): Promise<PayoutReading> =>
      ask(async () =>
        payoutReading(await stripe.payouts.retrieve(payoutId, {}, { stripeAccount: accountId })),
      ),
  };
}

/** Connected accounts and our own balance. */
function accountCalls(stripe: Stripe) {
  return {
    createAccount: (order: { email: string; memberId: string; idempotencyKey: string }) =>
      ask(async (): Promise<AccountReading> => {
        const account = await stripe.accounts.create(
          {
            type: 'express',
            country: 'US',
            email: order.email,
            capabilities: { transfers: { requested: true } },
            settings: { payouts: { schedule: { interval: 'manual' } } },
            metadata: { member_id: order.memberId },
          },
          { idempotencyKey: order.idempotencyKey },
        );
        return accountReading(account);
      }),
    createAccountLink: (order: {
      accountId: string;
      refreshUrl: string;
      returnUrl: string;
      idempotencyKey: string;
    }) =>
      ask(async (): Promise<string> => {
        const link = await stripe.accountLinks.create(
          {
            account: order.accountId,
            type: 'account_onboarding',
            refresh_url: order.refreshUrl,
            return_url: order.returnUrl,
          },
          { idempotencyKey: order.idempotencyKey },
        );
        return link.url;
      }),
    readAccount: (accountId: string): Promise<AccountReading> =>
      ask(async () => accountReading(await stripe.accounts.retrieve(accountId))),
    readBalance: (accountId?: string): Promise<BalanceReading> =>
      ask(async () =>
        balanceReading(
          await stripe.balance.retrieve({}, accountId === undefined ? {} : { stripeAccount: accountId }),
        ),
      ),
  };
}

/**
 * Narrow functions over the payment provider's SDK, which no other file imports. Every POST carries a key of ours, so that
 * a lost answer is asked for again and never done twice. Every failure is a `PaymentProviderError`. Never to be called
 * inside a transaction.
 */
export function createPaymentClient(configuration: PaymentConfiguration) {
  const stripe = connect(configuration);
  return {
    ...checkoutCalls(stripe),
    ...moneyCalls(stripe),
    ...payoutCalls(stripe),
    ...accountCalls(stripe),
    /** Proves that raw bytes were signed with our secret within the last five minutes, and reads them. */
    constructEvent(body: Buffer, signature: string): PaymentEvent {
      refuseFutureSignature(signature);
      try {
        return eventReading(
          stripe.webhooks.constructEvent(body, signature, configuration.webhookSecret, SIGNATURE_SECONDS_MAX),
        );
      } catch (error) {
        throw new PaymentProviderError('refused', 'signature-invalid', 'The signature is not valid', {
          cause: error,
        });
      }
    },
  };
}

export type PaymentClient = ReturnType<typeof createPaymentClient>;
