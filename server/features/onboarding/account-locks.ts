import type { Locks } from '#server/database/transaction.ts';
import { failedPayoutsOf, locksOfDeals } from '#server/features/payouts/payout-queries.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';

/** Guard rows of a change to a payout account: its member, and the deals whose failed payouts it may set going again. */
export async function locksOfAccount(providerAccountId: string): Promise<Locks | null> {
  const account = await PayoutAccount.findOne({
    where: { providerAccountId },
    attributes: ['memberId'],
  });
  if (account === null) return null;
  const failed = await failedPayoutsOf(account.memberId);
  return {
    members: [account.memberId],
    ...(await locksOfDeals(failed.map(({ dealId }) => dealId))),
  };
}
