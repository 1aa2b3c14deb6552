import { apiSend } from '../../../lib/api-client.ts';
import { lotUrl } from '../../../lib/lots.ts';

/** Removes a draft that the desk has never seen, with its photos and document. */
export function deleteDraft(code: string): Promise<null> {
  return apiSend<null>(`${lotUrl(code)}/draft`, { method: 'DELETE' });
}
