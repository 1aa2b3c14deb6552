import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Deal } from '#server/models/deal.ts';
import { LedgerBalance } from '#server/models/ledger-balance.ts';
import { accountIdOf, ownerOf, type AccountRef } from './account-ref.ts';

/**
 * The account and its balance row are born together, so that a first posting never races for a row that is not there.
 * Both statements leave an account that exists as it is; two openers of the same account mean the same id.
 */
async function openAccount(ref: AccountRef, { tx, now }: Unit): Promise<void> {
  const id = accountIdOf(ref);
  const known = await LedgerBalance.findByPk(id, { attributes: ['accountId'], transaction: tx });
  if (known !== null) return;
  await sequelize.query(
    "INSERT IGNORE INTO ledger_accounts (id, kind, owner_id, currency, created_at) VALUES (?, ?, ?, 'USD', ?)",
    { replacements: [id, ref.kind, ownerOf(ref), now], type: QueryTypes.INSERT, transaction: tx },
  );
  await sequelize.query(
    `INSERT INTO ledger_balances (account_id, kind, amount_minor, lock_version, created_at, updated_at)
     VALUES (?, ?, 0, 0, ?, ?) ON DUPLICATE KEY UPDATE account_id = account_id`,
    { replacements: [id, ref.kind, now, now], type: QueryTypes.INSERT, transaction: tx },
  );
}

/** Opens what the house owes a member and what lies on the member's account at the provider, at zero. Safe to repeat. */
export async function openMemberAccounts(memberId: string, unit: Unit): Promise<void> {
  await openAccount({ kind: 'member_payable', memberId }, unit);
  await openAccount({ kind: 'member_connected', memberId }, unit);
}

/** Opens the escrow account of a deal at zero, and its seller's accounts where they are missing. Safe to repeat. */
export async function openDealAccounts(dealId: string, unit: Unit): Promise<void> {
  await openAccount({ kind: 'escrow', dealId }, unit);
  const deal = await Deal.findByPk(dealId, { attributes: ['sellerId'], transaction: unit.tx });
  if (deal !== null) await openMemberAccounts(deal.sellerId, unit);
}
