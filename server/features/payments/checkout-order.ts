import { env } from '#server/env.ts';
import type { CheckoutOrder } from '#server/integrations/payments.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import type { Payment } from '#server/models/payment.ts';
import { invariant } from '#server/app-error.ts';

/**
 * The order for a hosted page, made of rows that do not change while the deal waits for its money: asked again, it comes
 * out the same, and the provider answers with the same session.
 */
export async function checkoutOrder(payment: Payment): Promise<CheckoutOrder> {
  const deal = await Deal.findByPk(payment.dealId, { include: [{ model: Lot, as: 'lot' }] });
  invariant(deal?.lot !== undefined, 'a payment has its deal and lot');
  const page = `${env.PUBLIC_URL}/deals/${deal.code}`;
  return {
    dealId: deal.id,
    dealCode: deal.code,
    description: `Lot ${deal.lot.code}, held in escrow until you accept it (deal ${deal.code})`,
    amountMinor: payment.amountMinor,
    expiresAt: payment.expiresAt,
    successUrl: `${page}?payment=returned`,
    cancelUrl: `${page}?payment=stopped`,
    idempotencyKey: `checkout:${deal.code}:v${payment.attempt}`,
  };
}
