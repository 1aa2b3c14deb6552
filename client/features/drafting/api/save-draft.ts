import type { LotAnswer, SaveDraftRequest } from '#shared/schemas/lots.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

/** Keeps the draft as typed; refused with `version-conflict` when it was saved elsewhere since. */
export function saveDraft(code: string, body: SaveDraftRequest): Promise<LotAnswer> {
  return apiSend<LotAnswer>(`${lotUrl(code)}/draft`, { method: 'PUT', body });
}
