import { invariant } from '#server/app-error.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { needsNewKey, PaymentProviderError } from '#server/integrations/payment-errors.ts';
import type { CheckoutReading } from '#server/integrations/payment-readings.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { applyCheckout, closePayment } from './apply-checkout.ts';
import { checkoutOrder } from './checkout-order.ts';
import { lapseDeal } from './lapse-deal.ts';
import { paidCheckout } from './paid-checkout.ts';
import { defineProviderTask } from '#server/features/provider-tasks/provider-task-handler.ts';

/**
 * The answer that would have told us the session may have been lost: asked again under its key, the provider gives it. When
 * it refuses the order instead, or keeps a failure under the key, there is no page that anyone could pay on.
 */
async function recoverSession(payment: Payment): Promise<string | null> {
  if (payment.providerSessionId !== null) return payment.providerSessionId;
  try {
    return (await paymentClient().createCheckout(await checkoutOrder(payment))).sessionId;
  } catch (error) {
    if (needsNewKey(error)) return null;
    throw error;
  }
}

/** Expires what is open. Between our look and our call the buyer may have paid: then the second look decides. */
async function expire(sessionId: string, key: string): Promise<CheckoutReading> {
  const provider = paymentClient();
  const seen = await provider.readCheckout(sessionId);
  if (seen.status !== 'open') return seen;
  try {
    return await provider.expireCheckout(sessionId, key);
  } catch (error) {
    if (error instanceof PaymentProviderError && error.kind === 'refused') {
      return provider.readCheckout(sessionId);
    }
    throw error;
  }
}

/** Ends an unpaid deal's session at the provider, then lapses the deal; when it turns out to be paid, funds it instead. */
export const expireSessionTask = defineProviderTask<CheckoutReading | null>({
  async effect(task, { key }) {
    const payment = await Payment.findOne({ where: { dealId: task.dealId } });
    if (payment === null || payment.state === 'expired' || payment.state === 'paid') return null;
    const sessionId = await recoverSession(payment);
    if (sessionId === null) return null;
    const reading = await expire(sessionId, key);
    const isDecided = reading.status === 'expired' || paidCheckout(reading) !== null;
    if (!isDecided) {
      throw new PaymentProviderError('unavailable', 'session-undecided', 'Neither paid nor expired yet');
    }
    return reading;
  },
  async finish(task, reading, unit) {
    if (reading === null) await closePayment({ dealId: task.dealId, sessionId: null }, unit);
    else await applyCheckout({ dealId: task.dealId, reading }, unit);
    const deal = await Deal.findByPk(task.dealId, { transaction: unit.tx });
    invariant(deal !== null, 'a task has its deal');
    const isOver = unit.now >= deal.fundBy && deal.frozenAt === null;
    if (deal.state === 'agreed' && isOver) await lapseDeal({ dealId: deal.id }, unit);
    return reading?.sessionId ?? null;
  },
});
