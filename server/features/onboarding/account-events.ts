import type { ProviderEventReader } from '#server/features/provider-events/provider-event-reader.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { locksOfAccount } from './account-locks.ts';
import { applyAccount } from './apply-account.ts';

/** An account changed: it is read again, as messages about it overtake one another. */
export const readAccountEvent: ProviderEventReader = async (event) => {
  const accountId = event.accountId ?? event.objectId;
  const locks = await locksOfAccount(accountId);
  if (locks === null) return null;
  const reading = await paymentClient().readAccount(accountId);
  return { locks, apply: (unit) => applyAccount({ reading }, unit) };
};
