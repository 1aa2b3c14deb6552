import type { Unit } from '#server/database/transaction.ts';
import { failedPayoutsOf } from '#server/features/payouts/payout-queries.ts';
import { retryPayout } from '#server/features/payouts/retry-payout.ts';
import type { AccountReading } from '#server/integrations/payment-readings.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';

function isSame(account: PayoutAccount, reading: AccountReading): boolean {
  return (
    account.detailsSubmitted === reading.detailsSubmitted &&
    account.transfersActive === reading.transfersActive &&
    account.payoutsEnabled === reading.payoutsEnabled &&
    JSON.stringify(account.requirements) === JSON.stringify(reading.requirements)
  );
}

/**
 * Keeps what the provider says of a member's account now. Once payouts work again, those that had failed are sent anew.
 * Answers whether anything changed. Locks: the member, and the lots and deals of his failed payouts, are held by the caller.
 */
export async function applyAccount({ reading }: { reading: AccountReading }, unit: Unit): Promise<boolean> {
  const account = await PayoutAccount.findOne({
    where: { providerAccountId: reading.accountId },
    transaction: unit.tx,
  });
  if (account === null) return false;
  const hadPayouts = account.payoutsEnabled;
  const isChanged = !isSame(account, reading);
  await account.update(
    {
      detailsSubmitted: reading.detailsSubmitted,
      transfersActive: reading.transfersActive,
      payoutsEnabled: reading.payoutsEnabled,
      requirements: reading.requirements,
      checkedAt: unit.now,
    },
    { transaction: unit.tx },
  );
  if (reading.payoutsEnabled && !hadPayouts) {
    for (const { dealId } of await failedPayoutsOf(account.memberId)) await retryPayout({ dealId }, unit);
  }
  return isChanged;
}
