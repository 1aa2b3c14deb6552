import type { DealAnswer, PurchaseRequest } from '#shared/schemas/deals.ts';
import { apiSend } from '../../../lib/api-client.ts';

export type PurchaseOrder = { code: string; body: PurchaseRequest; idempotencyKey: string };

/** Agrees to a lot at the total shown; the lot is reserved for the buyer until it is paid or the time is over. */
export function purchaseLot({ code, body, idempotencyKey }: PurchaseOrder): Promise<DealAnswer> {
  return apiSend<DealAnswer>(`/api/v1/lots/${encodeURIComponent(code)}/purchase`, { body, idempotencyKey });
}
