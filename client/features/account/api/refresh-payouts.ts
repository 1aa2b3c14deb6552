import type { MemberAnswer } from '#shared/schemas/session.ts';
import { apiSend } from '../../../lib/api-client.ts';

/** Asks the provider how the payout account stands now. */
export function refreshPayouts(): Promise<MemberAnswer['payouts']> {
  return apiSend('/api/v1/me/payout-account/refresh');
}
