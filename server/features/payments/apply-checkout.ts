import type { Unit } from '#server/database/transaction.ts';
import type { CheckoutReading } from '#server/integrations/payment-readings.ts';
import { Payment } from '#server/models/payment.ts';
import { fundDeal, type FundOutcome } from './fund-deal.ts';
import { paidCheckout } from './paid-checkout.ts';

export type CheckoutOutcome = FundOutcome | 'closed' | 'unchanged';

/** Notes that the session can no longer be paid. The deal keeps its state: that is the lapse's business. */
export async function closePayment(
  { dealId, sessionId }: { dealId: string; sessionId: string | null },
  unit: Unit,
): Promise<boolean> {
  const payment = await Payment.findOne({ where: { dealId }, transaction: unit.tx });
  if (payment === null || (payment.state !== 'starting' && payment.state !== 'open')) return false;
  if (sessionId !== null && payment.providerSessionId !== null && payment.providerSessionId !== sessionId) {
    return false;
  }
  await payment.update({ state: 'expired', sessionUrl: null }, { transaction: unit.tx });
  return true;
}

/**
 * Brings a deal in line with what the provider says of its session now: paid funds it, expired closes the payment. The one
 * way for webhook, return page, lapse and reconciliation. Locks: the lot and the deal are held by the caller.
 */
export async function applyCheckout(
  { dealId, reading }: { dealId: string; reading: CheckoutReading },
  unit: Unit,
): Promise<CheckoutOutcome> {
  const checkout = paidCheckout(reading);
  if (checkout !== null) return fundDeal({ dealId, checkout }, unit);
  if (reading.status !== 'expired') return 'unchanged';
  return (await closePayment({ dealId, sessionId: reading.sessionId }, unit)) ? 'closed' : 'unchanged';
}
