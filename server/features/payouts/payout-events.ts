import type { ProviderEventReader } from '#server/features/provider-events/provider-event-reader.ts';
import { findDealLocks } from '#server/features/payments/deal-locks.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { applyPayout } from './apply-payout.ts';
import { dealIdOfPayout } from './payout-queries.ts';

/** What a message says may be old news by now: the payout itself is read, and its present state applied. */
export const readPayoutEvent: ProviderEventReader = async (event) => {
  if (event.accountId === null) return null;
  const reading = await paymentClient().readPayout(event.objectId, event.accountId);
  const dealId = await dealIdOfPayout(reading.payoutId, reading.taskKey);
  const locks = dealId === null ? null : await findDealLocks(dealId);
  if (dealId === null || locks === null) return null;
  return { locks, apply: (unit) => applyPayout({ dealId, reading }, unit) };
};
