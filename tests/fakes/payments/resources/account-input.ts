import type Stripe from 'stripe';
import { z } from 'zod';
import { flag, integer, metadata, text, url } from '../input.ts';
import type { ShapeOf } from '../input.ts';

const capability = z.strictObject({ requested: flag });

const changeable = {
  email: z.email().optional(),
  business_type: z.enum(['individual', 'company']).optional(),
  metadata: metadata.optional(),
  business_profile: z
    .strictObject({ name: text, url, product_description: text, mcc: text, support_email: z.email() })
    .partial()
    .optional(),
  capabilities: z.strictObject({ transfers: capability, card_payments: capability }).partial().optional(),
  settings: z
    .strictObject({
      payouts: z
        .strictObject({
          schedule: z
            .strictObject({ interval: z.enum(['manual', 'daily', 'weekly', 'monthly']), delay_days: text })
            .partial(),
          statement_descriptor: text,
          debit_negative_balances: flag,
        })
        .partial(),
    })
    .partial()
    .optional(),
  tos_acceptance: z
    .strictObject({ service_agreement: z.enum(['full', 'recipient']), date: integer, ip: text })
    .partial()
    .optional(),
} satisfies ShapeOf<Stripe.AccountUpdateParams>;

export const createAccountInput = {
  ...changeable,
  type: z.literal('express', 'The stand-in knows only type express').optional(),
  country: z.literal('US', 'The stand-in knows only country US').optional(),
  default_currency: text.optional(),
  controller: z
    .strictObject({
      fees: z.strictObject({ payer: z.enum(['account', 'application']) }),
      losses: z.strictObject({ payments: z.enum(['application', 'stripe']) }),
      requirement_collection: z.literal('stripe'),
      stripe_dashboard: z.strictObject({ type: z.literal('express') }),
    })
    .partial()
    .optional(),
} satisfies ShapeOf<Stripe.AccountCreateParams>;
export type CreateAccount = z.output<z.ZodObject<typeof createAccountInput>>;

export const updateAccountInput = changeable;
export type UpdateAccount = z.output<z.ZodObject<typeof changeable>>;
