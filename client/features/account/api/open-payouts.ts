import { apiSend } from '../../../lib/api-client.ts';

/** A fresh link to the provider's onboarding page; it serves once and for minutes only. */
export function openPayouts(): Promise<{ url: string }> {
  return apiSend('/api/v1/me/payout-account');
}
