import type { z } from 'zod';
import type { refreshPaymentAnswer } from '#shared/schemas/deals.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { dealUrl } from '../../../lib/deals.ts';

export type PaymentStanding = z.infer<typeof refreshPaymentAnswer>;

/** Has the provider asked how the payment stands; what it says is applied before the answer. */
export function refreshPayment(code: string): Promise<PaymentStanding> {
  return apiSend(`${dealUrl(code)}/payment/refresh`);
}
