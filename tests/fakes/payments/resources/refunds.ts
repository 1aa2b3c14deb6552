import { z } from 'zod';
import type Stripe from 'stripe';
import { moveOutside } from '../balances.ts';
import { outside } from '../books.ts';
import { endpoint, find, pathId } from '../endpoint.ts';
import type { Call, Endpoint } from '../endpoint.ts';
import { invalidRequest, refused } from '../errors.ts';
import { emit } from '../events.ts';
import { allOf, idOf, keep, mustFind, newId, now, platform } from '../fake.ts';
import type { Fake } from '../fake.ts';
import { amount, listInput, mergeMetadata, metadata, text } from '../input.ts';
import type { ShapeOf } from '../input.ts';
import { paginate } from '../paginate.ts';

const createInput = {
  charge: text.optional(),
  payment_intent: text.optional(),
  amount: amount.optional(),
  reason: z.enum(['duplicate', 'fraudulent', 'requested_by_customer']).optional(),
  metadata: metadata.optional(),
} satisfies ShapeOf<Stripe.RefundCreateParams>;

type Create = z.output<z.ZodObject<typeof createInput>>;

function chargeOf(call: Call<Create>): Stripe.Charge {
  const { charge, payment_intent: intentId } = call.input;
  if (charge !== undefined) return find(call, 'charge', charge, 'charge');
  if (intentId === undefined) {
    throw invalidRequest('One of the following params should be provided: payment_intent or charge.');
  }
  const intent = find(call, 'payment_intent', intentId, 'payment_intent');
  const latest = idOf(intent.latest_charge);
  if (intent.status !== 'succeeded' || latest === null) {
    throw refused(
      'This PaymentIntent does not have a successful charge to refund.',
      'payment_intent_unexpected_state',
      'payment_intent',
    );
  }
  return find(call, 'charge', latest, 'charge');
}

function refundMovement(fake: Fake, charge: Stripe.Charge, refund: Stripe.Refund): string {
  const charged = mustFind(fake, 'balance_transaction', idOf(charge.balance_transaction) ?? '');
  const entry = moveOutside(fake, {
    owner: platform,
    counterpart: outside.cards,
    amount: -refund.amount,
    currency: refund.currency,
    type: 'refund',
    category: 'refund',
    source: refund.id,
    description: 'REFUND FOR CHARGE',
    availableOn: Math.max(now(fake), charged.available_on),
  });
  return entry.id;
}

function createRefund(call: Call<Create>): Stripe.Refund {
  const { fake, input } = call;
  const charge = chargeOf(call);
  if (!charge.paid || charge.payment_intent === null) {
    throw refused(`Charge ${charge.id} cannot be refunded.`, 'charge_not_refundable', 'charge');
  }
  if (charge.disputed) {
    throw refused(`Charge ${charge.id} has been charged back.`, 'charge_disputed', 'charge');
  }
  const rest = charge.amount - charge.amount_refunded;
  if (rest === 0) {
    throw refused(`Charge ${charge.id} has already been refunded.`, 'charge_already_refunded');
  }
  const size = input.amount ?? rest;
  if (size > rest) {
    throw refused(
      `Refund amount (${size}) is greater than unrefunded amount on charge (${rest}).`,
      'amount_too_large',
      'amount',
    );
  }
  const refund: Stripe.Refund = {
    id: newId('re'),
    object: 'refund',
    amount: size,
    balance_transaction: null,
    charge: charge.id,
    created: now(fake),
    currency: charge.currency,
    customer: null,
    customer_account: null,
    destination_details: { card: { type: 'refund', reference_status: 'pending' }, type: 'card' },
    metadata: mergeMetadata({}, input.metadata),
    payment_intent: charge.payment_intent,
    payment_method: charge.payment_method,
    reason: input.reason ?? null,
    receipt_number: null,
    source_transfer_reversal: null,
    status: 'succeeded',
    transfer_reversal: null,
  };
  keep(fake, call.owner, refund);
  refund.balance_transaction = refundMovement(fake, charge, refund);
  charge.amount_refunded += size;
  charge.refunded = charge.amount_refunded === charge.amount;
  emit(fake, platform, 'refund.created', refund, { request: call.request });
  emit(fake, platform, 'charge.refunded', charge, { request: call.request });
  // The card network gives its reference later, which shows as an update.
  refund.destination_details = {
    card: { type: 'refund', reference: refund.id.slice(-12), reference_status: 'available' },
    type: 'card',
  };
  emit(fake, platform, 'refund.updated', refund);
  return refund;
}

/** A refund that the card network sends back: the money returns to the platform. */
export function failRefund(fake: Fake, refund: Stripe.Refund): boolean {
  if (refund.status !== 'succeeded') return false;
  const charge = mustFind(fake, 'charge', idOf(refund.charge) ?? '');
  refund.status = 'failed';
  refund.failure_reason = 'lost_or_stolen_card';
  const entry = moveOutside(fake, {
    owner: platform,
    counterpart: outside.cards,
    amount: refund.amount,
    currency: refund.currency,
    type: 'refund_failure',
    category: 'refund_failure',
    source: refund.id,
    description: 'REFUND FAILURE',
    availableOn: now(fake),
  });
  refund.failure_balance_transaction = entry.id;
  charge.amount_refunded -= refund.amount;
  charge.refunded = false;
  emit(fake, platform, 'refund.failed', refund);
  fake.store.touch();
  return true;
}

export const refundEndpoints: Endpoint[] = [
  endpoint('POST', '/v1/refunds', createInput, createRefund),
  endpoint('GET', '/v1/refunds/:id', {}, (call) => find(call, 'refund', pathId(call))),
  endpoint(
    'GET',
    '/v1/refunds',
    { ...listInput, charge: text.optional(), payment_intent: text.optional() },
    (call) => {
      const { charge, payment_intent: intent } = call.input;
      const refunds = allOf(call.fake, 'refund', call.owner).filter(
        (refund) =>
          (charge === undefined || refund.charge === charge) &&
          (intent === undefined || refund.payment_intent === intent),
      );
      return paginate(refunds, call.input, '/v1/refunds');
    },
  ),
];
