import { apiSend } from '../../../lib/api-client.ts';

export type PaymentOrder = { dealCode: string; idempotencyKey: string };

/** Opens, or finds again, the hosted page on which the deal is paid. */
export function startPayment({ dealCode, idempotencyKey }: PaymentOrder) {
  return apiSend<{ url: string; expiresAt: string }>(
    `/api/v1/deals/${encodeURIComponent(dealCode)}/payment`,
    { idempotencyKey },
  );
}
