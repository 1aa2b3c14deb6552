import type Stripe from 'stripe';
import { z } from 'zod';
import { amount, currency, flag, integer, metadata, text, url } from '../input.ts';
import type { ShapeOf } from '../input.ts';

const product = z.strictObject({
  name: text,
  description: text.optional(),
  images: z.array(url).max(8).optional(),
  metadata: metadata.optional(),
});

const lineItem = z.strictObject({
  price_data: z.strictObject({ currency, unit_amount: amount, product_data: product }),
  quantity: integer.refine((value) => value >= 1 && value <= 999_999, 'Invalid quantity'),
});

const intentData = z.strictObject({
  transfer_group: text.optional(),
  metadata: metadata.optional(),
  description: text.optional(),
});

export const createSessionInput = {
  mode: z.literal('payment', 'The stand-in knows only mode payment'),
  success_url: text,
  cancel_url: text.optional(),
  line_items: z.array(lineItem).min(1).max(100),
  client_reference_id: z.string().min(1).max(200).optional(),
  customer_email: z.email().optional(),
  expires_at: integer.optional(),
  locale: text.optional(),
  metadata: metadata.optional(),
  payment_intent_data: intentData.optional(),
  /** This version of the API has no `payment_method_types` here any more. */
  allowed_payment_method_types: z
    .array(z.enum(['card']))
    .min(1)
    .optional(),
  submit_type: z.enum(['auto', 'pay', 'book', 'donate']).optional(),
  allow_promotion_codes: flag.optional(),
} satisfies ShapeOf<Stripe.Checkout.SessionCreateParams>;

export const createSessionSchema = z.strictObject(createSessionInput);
export type CreateSession = z.output<typeof createSessionSchema>;
