import { invariant } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { openMemberAccounts } from '#server/features/ledger/open-accounts.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';

/**
 * First half of onboarding: the member's one payout account row and ledger accounts. Safe to repeat. Locks: the member is
 * held by the caller.
 */
export async function openPayoutAccount(
  { memberId }: { memberId: string },
  unit: Unit,
): Promise<PayoutAccount> {
  await openMemberAccounts(memberId, unit);
  const known = await PayoutAccount.findOne({ where: { memberId }, transaction: unit.tx });
  if (known !== null) return known;
  return PayoutAccount.create(
    { id: newId(), memberId, providerAccountId: null, requirements: [] },
    { transaction: unit.tx },
  );
}

/** Second half: keeps the id of the account at the provider. The first one stays. Locks: the member is held by the caller. */
export async function linkPayoutAccount(
  { memberId, accountId }: { memberId: string; accountId: string },
  unit: Unit,
): Promise<PayoutAccount> {
  const account = await PayoutAccount.findOne({ where: { memberId }, transaction: unit.tx });
  invariant(account !== null, 'the payout account was opened before');
  if (account.providerAccountId === null) {
    await account.update({ providerAccountId: accountId }, { transaction: unit.tx });
  }
  return account;
}
