import type Stripe from 'stripe';
import { cardBrand } from '../cards.ts';
import { newId, now } from '../fake.ts';
import type { Fake } from '../fake.ts';

const unused = {
  application: null,
  application_fee: null,
  application_fee_amount: null,
  calculated_statement_descriptor: null,
  customer: null,
  disputed: false,
  failure_balance_transaction: null,
  fraud_details: null,
  livemode: false,
  on_behalf_of: null,
  receipt_email: null,
  receipt_number: null,
  receipt_url: null,
  review: null,
  shipping: null,
  source: null,
  statement_descriptor: null,
  statement_descriptor_suffix: null,
  transfer_data: null,
} as const;

export interface Card {
  number: string;
  expiryMonth: number;
  expiryYear: number;
  name: string | null;
}

function cardDetails(card: Card, amount: number): Stripe.Charge.PaymentMethodDetails {
  return {
    type: 'card',
    card: {
      amount_authorized: amount,
      authorization_code: null,
      brand: cardBrand(card.number),
      checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: 'pass' },
      country: 'US',
      electronic_commerce_indicator: null,
      exp_month: card.expiryMonth,
      exp_year: card.expiryYear,
      fingerprint: `card${card.number.slice(-8)}`,
      funding: 'credit',
      installments: null,
      last4: card.number.slice(-4),
      mandate: null,
      network: cardBrand(card.number),
      network_transaction_id: null,
      regulated_status: 'unregulated',
      three_d_secure: null,
      transaction_link_id: null,
      wallet: null,
    },
  };
}

function outcome(decline: { code: string; declineCode: string | null; message: string } | null) {
  return {
    advice_code: null,
    network_advice_code: null,
    network_decline_code: null,
    network_status: decline ? 'declined_by_network' : 'approved_by_network',
    reason: decline ? (decline.declineCode ?? decline.code) : null,
    risk_level: 'normal',
    seller_message: decline ? decline.message : 'Payment complete.',
    type: decline ? 'issuer_declined' : 'authorized',
  } satisfies Stripe.Charge.Outcome;
}

interface CardCharge {
  intent: Stripe.PaymentIntent;
  card: Card;
  decline: { code: string; declineCode: string | null; message: string } | null;
}

/** A charge on the platform by card, paid or declined. */
export function buildCardCharge(fake: Fake, { intent, card, decline }: CardCharge) {
  const isPaid = decline === null;
  return {
    ...unused,
    id: newId('ch'),
    object: 'charge',
    amount: intent.amount,
    amount_captured: isPaid ? intent.amount : 0,
    amount_refunded: 0,
    balance_transaction: null as string | null,
    billing_details: { address: null, email: null, name: card.name, phone: null, tax_id: null },
    captured: isPaid,
    created: now(fake),
    currency: intent.currency,
    description: intent.description,
    failure_code: decline?.code ?? null,
    failure_message: decline?.message ?? null,
    metadata: { ...intent.metadata },
    outcome: outcome(decline),
    paid: isPaid,
    payment_intent: intent.id,
    payment_method: newId('pm'),
    payment_method_details: cardDetails(card, intent.amount),
    refunded: false,
    source_transfer: null,
    status: isPaid ? 'succeeded' : 'failed',
    transfer_group: intent.transfer_group,
  } satisfies Stripe.Charge;
}

/** The payment that a transfer makes at its destination. */
export function buildTransferPayment(
  fake: Fake,
  transfer: { id: string; amount: number; currency: string; transfer_group: string | null },
) {
  return {
    ...unused,
    id: newId('py'),
    object: 'charge',
    amount: transfer.amount,
    amount_captured: transfer.amount,
    amount_refunded: 0,
    balance_transaction: null as string | null,
    billing_details: { address: null, email: null, name: null, phone: null, tax_id: null },
    captured: true,
    created: now(fake),
    currency: transfer.currency,
    description: null,
    failure_code: null,
    failure_message: null,
    metadata: {},
    outcome: null,
    paid: true,
    payment_intent: null,
    payment_method: null,
    payment_method_details: null,
    refunded: false,
    source_transfer: transfer.id,
    status: 'succeeded',
    transfer_group: transfer.transfer_group,
  } satisfies Stripe.Charge;
}
