import { AppError } from '#server/app-error.ts';
import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import { logger } from '#server/logger.ts';

/**
 * Calls the provider on behalf of a request. A failure becomes an answer that says to come again; a definite no becomes one
 * that says so, as coming again would not help.
 */
export async function asRefusal<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    if (!(error instanceof PaymentProviderError)) throw error;
    logger.warn({ err: error, kind: error.kind, code: error.code }, 'the payment provider did not do it');
    if (error.kind !== 'refused') throw new AppError('payment-provider-unavailable');
    throw new AppError(
      'payment-refused-by-provider',
      'The payment provider refuses this as it stands. Nothing was charged.',
    );
  }
}
