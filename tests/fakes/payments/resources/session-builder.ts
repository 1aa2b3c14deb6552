import type Stripe from 'stripe';
import { newId, now } from '../fake.ts';
import type { Fake } from '../fake.ts';
import type { CreateSession } from './checkout-input.ts';

const unused = {
  adaptive_pricing: null,
  after_expiration: null,
  automatic_tax: { enabled: false, liability: null, provider: null, status: null },
  billing_address_collection: null,
  client_secret: null,
  collected_information: null,
  consent: null,
  consent_collection: null,
  currency_conversion: null,
  custom_text: {
    after_submit: null,
    shipping_address: null,
    submit: null,
    terms_of_service_acceptance: null,
  },
  customer: null,
  customer_account: null,
  customer_creation: 'if_required',
  customer_details: null,
  integration_identifier: null,
  invoice: null,
  invoice_creation: null,
  livemode: false,
  managed_payments: null,
  origin_context: null,
  payment_intent: null,
  payment_link: null,
  payment_method_collection: 'if_required',
  payment_method_configuration_details: null,
  payment_method_options: null,
  permissions: null,
  recovered_from: null,
  saved_payment_method_options: null,
  setup_intent: null,
  shipping_address_collection: null,
  shipping_cost: null,
  subscription: null,
  ui_mode: 'hosted_page',
  wallet_options: null,
} as const;

function buildPrice(fake: Fake, item: CreateSession['line_items'][number]) {
  return {
    id: newId('price'),
    object: 'price',
    active: false,
    billing_scheme: 'per_unit',
    created: now(fake),
    currency: item.price_data.currency,
    custom_unit_amount: null,
    livemode: false,
    lookup_key: null,
    metadata: {},
    nickname: null,
    product: newId('prod', 14),
    recurring: null,
    tax_behavior: 'unspecified',
    tiers_mode: null,
    transform_quantity: null,
    type: 'one_time',
    unit_amount: item.price_data.unit_amount,
    unit_amount_decimal: null,
  } satisfies Stripe.Price;
}

export function buildItem(fake: Fake, item: CreateSession['line_items'][number]) {
  const total = item.price_data.unit_amount * item.quantity;
  return {
    id: newId('li'),
    object: 'item',
    adjustable_quantity: null,
    amount_discount: 0,
    amount_subtotal: total,
    amount_tax: 0,
    amount_total: total,
    currency: item.price_data.currency,
    description: item.price_data.product_data.name,
    metadata: {},
    price: buildPrice(fake, item),
    quantity: item.quantity,
  } satisfies Stripe.LineItem;
}

export function buildSession(fake: Fake, input: CreateSession, total: number, expiresAt: number) {
  const id = newId('cs_test', 58);
  return {
    ...unused,
    id,
    object: 'checkout.session',
    allow_promotion_codes: input.allow_promotion_codes ?? null,
    allowed_payment_method_types: input.allowed_payment_method_types ?? null,
    amount_subtotal: total,
    amount_total: total,
    cancel_url: input.cancel_url ?? null,
    client_reference_id: input.client_reference_id ?? null,
    created: now(fake),
    currency: 'usd',
    custom_fields: [],
    customer_email: input.customer_email ?? null,
    discounts: [],
    expires_at: expiresAt,
    locale: input.locale ?? null,
    metadata: { ...input.metadata },
    mode: 'payment',
    payment_method_types: ['card'],
    payment_status: 'unpaid',
    shipping_options: [],
    status: 'open',
    submit_type: input.submit_type ?? null,
    success_url: input.success_url,
    total_details: { amount_discount: 0, amount_shipping: 0, amount_tax: 0 },
    url: `${fake.publicUrl}/pay/${id}`,
  } satisfies Stripe.Checkout.Session;
}
