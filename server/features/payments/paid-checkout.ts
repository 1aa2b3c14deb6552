import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import type { CheckoutReading } from '#server/integrations/payment-readings.ts';

/** A session that the provider says is paid, with all that the books need. */
export type PaidCheckout = {
  sessionId: string;
  amountMinor: bigint;
  currency: string;
  paymentIntentId: string;
  chargeId: string;
  balanceTransactionId: string;
  feeMinor: bigint;
};

/**
 * The paid session of a reading, or null when it is not paid. The provider books a charge a moment after it succeeded;
 * until then the fee is not known, and the caller comes again.
 */
export function paidCheckout(reading: CheckoutReading): PaidCheckout | null {
  if (!reading.isPaid) return null;
  const { paymentIntentId, chargeId, balanceTransactionId, feeMinor } = reading;
  if (paymentIntentId === null || chargeId === null || balanceTransactionId === null || feeMinor === null) {
    throw new PaymentProviderError('unavailable', 'charge-not-booked', 'The charge is not booked yet');
  }
  const { sessionId, amountMinor, currency } = reading;
  return { sessionId, amountMinor, currency, paymentIntentId, chargeId, balanceTransactionId, feeMinor };
}
