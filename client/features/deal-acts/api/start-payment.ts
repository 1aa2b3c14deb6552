import { apiSend } from '../../../lib/api-client.ts';
import { dealUrl } from '../../../lib/deals.ts';

/** Opens, or finds again, the hosted page on which the deal is paid. */
export function startPayment(
  code: string,
  idempotencyKey: string,
): Promise<{ url: string; expiresAt: string }> {
  return apiSend(`${dealUrl(code)}/payment`, { idempotencyKey });
}
