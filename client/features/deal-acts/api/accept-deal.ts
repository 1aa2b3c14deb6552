import type { DealAnswer } from '#shared/schemas/deals.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { dealUrl } from '../../../lib/deals.ts';

export function acceptDeal(code: string, idempotencyKey: string): Promise<DealAnswer> {
  return apiSend(`${dealUrl(code)}/accept`, { body: {}, idempotencyKey });
}
