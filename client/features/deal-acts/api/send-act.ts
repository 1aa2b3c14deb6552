import type { DealAnswer } from '#shared/schemas/deals.ts';
import { apiSend } from '../../../lib/api-client.ts';
import { dealUrl } from '../../../lib/deals.ts';

type SideAct = 'ship' | 'confirm-delivery' | 'receipt' | 'contest';
type DeskAct = 'take-up' | 'freeze' | 'unfreeze';

/** Acts that move no money; each answers the deal as it then stands. */
export function sendAct(code: string, act: SideAct, body: unknown = {}): Promise<DealAnswer> {
  return apiSend(`${dealUrl(code)}/${act}`, { body });
}

export function sendDeskAct(code: string, act: DeskAct, body: unknown = {}): Promise<DealAnswer> {
  return apiSend(`/api/v1/desk/deals/${encodeURIComponent(code)}/${act}`, { body });
}
