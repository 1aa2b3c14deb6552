import type { DealAnswer, RulingRequest } from '#shared/schemas/deals.ts';
import { apiSend } from '../../../lib/api-client.ts';

export function ruleDeal(code: string, body: RulingRequest, idempotencyKey: string): Promise<DealAnswer> {
  return apiSend(`/api/v1/desk/deals/${encodeURIComponent(code)}/ruling`, { body, idempotencyKey });
}
