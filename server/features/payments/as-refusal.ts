import { AppError } from '#server/app-error.ts';
import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import { logger } from '#server/logger.ts';

/** Calls the provider on behalf of a request; its failure becomes an answer that says to come again. */
export async function asRefusal<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    if (!(error instanceof PaymentProviderError)) throw error;
    logger.warn({ err: error, kind: error.kind, code: error.code }, 'the payment provider did not do it');
    throw new AppError('payment-provider-unavailable');
  }
}
