import type Stripe from 'stripe';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Endpoint } from '../endpoint.ts';
import { refused } from '../errors.ts';
import { emit } from '../events.ts';
import type { RequestNote } from '../events.ts';
import { allOf, keep, mustFind, newId, now, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { listInput, mergeMetadata, metadata, text } from '../input.ts';
import { paginate } from '../paginate.ts';

const unused = {
  allowed_payment_method_types: null,
  amount_capturable: 0,
  application: null,
  application_fee_amount: null,
  automatic_payment_methods: null,
  canceled_at: null,
  cancellation_reason: null,
  capture_method: 'automatic_async',
  confirmation_method: 'automatic',
  customer: null,
  customer_account: null,
  excluded_payment_method_types: null,
  last_payment_error: null,
  latest_charge: null,
  livemode: false,
  managed_payments: null,
  next_action: null,
  on_behalf_of: null,
  payment_method: null,
  payment_method_configuration_details: null,
  payment_method_options: null,
  payment_record: null,
  processing: null,
  receipt_email: null,
  review: null,
  setup_future_usage: null,
  shipping: null,
  source: null,
  statement_descriptor: null,
  statement_descriptor_suffix: null,
  transfer_data: null,
} as const;

/** A session's payment intent comes into being with its first attempt to pay. */
export function createIntent(fake: Fake, session: Stripe.Checkout.Session): Stripe.PaymentIntent {
  const details = fake.state.sessionDetails[session.id];
  const id = newId('pi');
  const intent = {
    ...unused,
    id,
    object: 'payment_intent',
    amount: session.amount_total ?? 0,
    amount_received: 0,
    client_secret: `${id}_secret_${newId('x').slice(2)}`,
    created: now(fake),
    currency: session.currency ?? 'usd',
    description: details?.description ?? null,
    metadata: { ...details?.intentMetadata },
    payment_method_types: [...session.payment_method_types],
    status: 'requires_payment_method',
    transfer_group: details?.transferGroup ?? null,
  } satisfies Stripe.PaymentIntent;
  return keep<Stripe.PaymentIntent>(fake, platform, intent);
}

export function cancelIntent(fake: Fake, id: string, reason: string | null, request?: RequestNote) {
  const intent = mustFind(fake, 'payment_intent', id);
  intent.status = 'canceled';
  intent.canceled_at = now(fake);
  intent.cancellation_reason = reason as Stripe.PaymentIntent.CancellationReason | null;
  emit(fake, platform, 'payment_intent.canceled', intent, { ...(request && { request }) });
  fake.store.touch();
  return intent;
}

const cancellable = new Set(['requires_payment_method', 'requires_confirmation', 'requires_action']);

export const paymentIntentEndpoints: Endpoint[] = [
  endpoint('GET', '/v1/payment_intents/:id', {}, (call) => find(call, 'payment_intent', pathId(call))),
  endpoint('GET', '/v1/payment_intents', { ...listInput }, (call) =>
    paginate(allOf(call.fake, 'payment_intent', call.owner), call.input, '/v1/payment_intents'),
  ),
  endpoint('POST', '/v1/payment_intents/:id', { metadata: metadata.optional() }, (call) => {
    const intent = find(call, 'payment_intent', pathId(call));
    intent.metadata = mergeMetadata(intent.metadata, call.input.metadata);
    call.fake.store.touch();
    return intent;
  }),
  endpoint('POST', '/v1/payment_intents/:id/cancel', { cancellation_reason: text.optional() }, (call) => {
    const intent = find(call, 'payment_intent', pathId(call));
    const holder = allOf(call.fake, 'checkout.session').find(
      (session) => session.payment_intent === intent.id && session.status === 'open',
    );
    if (holder) {
      throw refused(
        'You cannot cancel this PaymentIntent because it belongs to a Checkout Session. Expire the session instead.',
        'payment_intent_unexpected_state',
      );
    }
    if (!cancellable.has(intent.status)) {
      throw refused(
        `You cannot cancel this PaymentIntent because it has a status of ${intent.status}.`,
        'payment_intent_unexpected_state',
      );
    }
    return cancelIntent(call.fake, intent.id, call.input.cancellation_reason ?? null, call.request);
  }),
];
