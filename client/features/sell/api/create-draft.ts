import type { LotAnswer } from '#shared/schemas/lots.ts';
import { apiSend } from '../../../lib/api-client.ts';

/** A new draft: blank, or with what was typed for another own lot. */
export function createDraft(copyOf?: string): Promise<LotAnswer> {
  return apiSend<LotAnswer>('/api/v1/lots', { body: copyOf === undefined ? {} : { copyOf } });
}
