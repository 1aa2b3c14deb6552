import type { LotAnswer } from '#shared/schemas/lots.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

/** Hands the saved draft to the desk; refused with a pointer for each thing that is missing. */
export function submitLot(code: string): Promise<LotAnswer> {
  return apiSend<LotAnswer>(`${lotUrl(code)}/submit`);
}
