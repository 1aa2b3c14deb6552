import { QueryTypes, UniqueConstraintError } from 'sequelize';
import { AMOUNT_MAX_MINOR } from '#shared/money.ts';
import { ConflictError, invariant } from '#server/app-error.ts';
import { sequelize } from '#server/database/connection.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { LedgerEntry } from '#server/models/ledger-entry.ts';
import { LedgerJournal } from '#server/models/ledger-journal.ts';
import { accountIdOf, hasBalanceRow, type AccountRef } from './account-ref.ts';

export type JournalKind = LedgerJournal['kind'];
export type JournalEntry = { account: AccountRef; amountMinor: bigint };

export type JournalInput = {
  kind: JournalKind;
  dealId: string | null;
  /** Names the happening for ever; a second journal under it is refused. Such as `funding:<deal id>`. */
  uniqueKey: string;
  memo: string;
  providerObjectId?: string | null;
  reversesJournalId?: string | null;
  /** Assets positive, liabilities negative; one entry an account; together zero. */
  entries: readonly JournalEntry[];
};

/** Balances stay far inside what a BIGINT and a JSON number hold exactly. */
const BALANCE_MAX_MINOR = 1_000_000_000_000_000n;

function isWithin(amountMinor: bigint, limit: bigint): boolean {
  return amountMinor <= limit && amountMinor >= -limit;
}

/** Stays on in production: what breaks one of these rules must not reach the table. */
function assertBalanced(entries: readonly JournalEntry[]): void {
  invariant(entries.length >= 2, 'a journal has at least two entries');
  let sum = 0n;
  for (const { amountMinor } of entries) {
    invariant(amountMinor !== 0n, 'an entry of nothing is no entry');
    invariant(isWithin(amountMinor, AMOUNT_MAX_MINOR), 'an entry stays within the largest amount');
    sum += amountMinor;
  }
  invariant(sum === 0n, `a journal sums to zero, not to ${sum}`);
  const accounts = new Set(entries.map(({ account }) => accountIdOf(account)));
  invariant(accounts.size === entries.length, 'a journal names each account once');
}

/** Locks each balance by ascending account id, so that no two journals wait for each other, then writes it. */
async function moveBalances(entries: readonly JournalEntry[], { tx, now }: Unit): Promise<void> {
  const kept = entries
    .filter(({ account }) => hasBalanceRow(account))
    .map((entry) => ({ ...entry, accountId: accountIdOf(entry.account) }))
    .sort((left, right) => (left.accountId < right.accountId ? -1 : 1));
  for (const { account, accountId, amountMinor } of kept) {
    const rows = await sequelize.query<{ amount: number }>(
      'SELECT amount_minor AS amount FROM ledger_balances WHERE account_id = ? FOR UPDATE',
      { replacements: [accountId], type: QueryTypes.SELECT, transaction: tx },
    );
    invariant(rows[0] !== undefined, `the ${account.kind} account is not open`);
    const next = BigInt(rows[0].amount) + amountMinor;
    invariant(isWithin(next, BALANCE_MAX_MINOR), 'a balance stays within its bounds');
    if (account.kind === 'escrow' && next > 0n) {
      throw new ConflictError('deal-not-funded', 'Escrow does not hold what is to leave it.');
    }
    await sequelize.query(
      'UPDATE ledger_balances SET amount_minor = ?, lock_version = lock_version + 1, updated_at = ? WHERE account_id = ?',
      { replacements: [next.toString(), now, accountId], type: QueryTypes.UPDATE, transaction: tx },
    );
  }
}

async function insertJournal(input: JournalInput, unit: Unit): Promise<string> {
  const id = newId();
  try {
    await LedgerJournal.create(
      {
        id,
        kind: input.kind,
        dealId: input.dealId,
        uniqueKey: input.uniqueKey,
        providerObjectId: input.providerObjectId ?? null,
        reversesJournalId: input.reversesJournalId ?? null,
        memo: input.memo,
        at: unit.now,
      },
      { transaction: unit.tx },
    );
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new ConflictError('illegal-transition', `“${input.uniqueKey}” has been booked already.`);
    }
    throw error;
  }
  return id;
}

/**
 * Books one happening, all of it or nothing. Guarantees: at least two entries, none of them zero, all within bounds, one an
 * account, together exactly zero; a `uniqueKey` is booked once; escrow never gives what it does not hold. Locks the
 * balances of deal and member accounts by ascending account id; accounts of the house are append-only and take no lock.
 * The caller holds the guard rows (lots, deals) already. Answers the journal's id.
 *
 * Throws `illegal-transition` when the key was booked before, `deal-not-funded` when escrow would be overdrawn; anything
 * else that does not add up is a fault of the program.
 */
export async function postJournal(input: JournalInput, unit: Unit): Promise<string> {
  assertBalanced(input.entries);
  const journalId = await insertJournal(input, unit);
  await moveBalances(input.entries, unit);
  await LedgerEntry.bulkCreate(
    input.entries.map(({ account, amountMinor }) => ({
      id: newId(),
      journalId,
      accountId: accountIdOf(account),
      amountMinor,
      currency: 'USD',
    })),
    { transaction: unit.tx },
  );
  return journalId;
}
