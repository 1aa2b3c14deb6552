import { QueryTypes, type Transaction } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { accountIdOf, type AccountKind, type AccountRef } from './account-ref.ts';

/** One entry with its journal; `at` and the journal's id give a stable order. */
export type LedgerLine = {
  journalId: string;
  kind: string;
  memo: string;
  at: Date;
  account: AccountKind;
  ownerId: string;
  amountMinor: bigint;
  providerObjectId: string | null;
};

type RawLine = Omit<LedgerLine, 'amountMinor'> & { amount: number };

function lineOf({ amount, ...line }: RawLine): LedgerLine {
  return { ...line, amountMinor: BigInt(amount) };
}

const LINES = `
  SELECT j.id AS journalId, j.kind, j.memo, j.at, a.kind AS account, a.owner_id AS ownerId,
         e.amount_minor AS amount, j.provider_object_id AS providerObjectId
    FROM ledger_journals j
    JOIN ledger_entries e ON e.journal_id = j.id
    JOIN ledger_accounts a ON a.id = e.account_id`;

/** Journals of one moment in the order in which they follow from one another; an id is no order. */
const IN_ORDER = `ORDER BY j.at, FIELD(j.kind, 'funding', 'provider_fee', 'settlement', 'transfer', 'payout',
  'payout_returned', 'refund', 'reversal'), j.id, e.amount_minor DESC, a.kind`;

/** What is held in escrow for a deal; zero where its account is not open. */
export async function heldMinor(dealId: string, tx?: Transaction): Promise<bigint> {
  const rows = await sequelize.query<{ amount: number }>(
    'SELECT amount_minor AS amount FROM ledger_balances WHERE account_id = ?',
    {
      replacements: [accountIdOf({ kind: 'escrow', dealId })],
      type: QueryTypes.SELECT,
      ...(tx === undefined ? {} : { transaction: tx }),
    },
  );
  return rows[0] === undefined ? 0n : -BigInt(rows[0].amount);
}

/** Balance of any account as the sum of its entries: the only truth for accounts of the house. */
export async function accountSumMinor(ref: AccountRef, tx?: Transaction): Promise<bigint> {
  const rows = await sequelize.query<{ amount: string | null }>(
    'SELECT CAST(SUM(amount_minor) AS CHAR) AS amount FROM ledger_entries WHERE account_id = ?',
    {
      replacements: [accountIdOf(ref)],
      type: QueryTypes.SELECT,
      ...(tx === undefined ? {} : { transaction: tx }),
    },
  );
  return BigInt(rows[0]?.amount ?? '0');
}

/** Every entry of a deal, in the order in which it was booked. */
export async function dealLedger(dealId: string): Promise<LedgerLine[]> {
  const rows = await sequelize.query<RawLine>(`${LINES} WHERE j.deal_id = ? ${IN_ORDER}`, {
    replacements: [dealId],
    type: QueryTypes.SELECT,
  });
  return rows.map(lineOf);
}

/** The newest entries of one account with the balance after each, newest first. */
export async function accountStatement(
  ref: AccountRef,
  limit = 100,
): Promise<(LedgerLine & { balanceMinor: bigint })[]> {
  const rows = await sequelize.query<RawLine>(
    `${LINES} WHERE a.id = ? ORDER BY j.at DESC, j.id DESC LIMIT ?`,
    {
      replacements: [accountIdOf(ref), limit],
      type: QueryTypes.SELECT,
    },
  );
  let balanceMinor = await accountSumMinor(ref);
  return rows.map(lineOf).map((line) => {
    const after = { ...line, balanceMinor };
    balanceMinor -= line.amountMinor;
    return after;
  });
}

/** Sum of every kind of account; together they are zero. */
export async function trialBalance(): Promise<{ account: AccountKind; amountMinor: bigint }[]> {
  const rows = await sequelize.query<{ account: AccountKind; amount: string }>(
    `SELECT a.kind AS account, CAST(SUM(e.amount_minor) AS CHAR) AS amount
       FROM ledger_entries e JOIN ledger_accounts a ON a.id = e.account_id
      GROUP BY a.kind ORDER BY a.kind`,
    { type: QueryTypes.SELECT },
  );
  return rows.map(({ account, amount }) => ({ account, amountMinor: BigInt(amount) }));
}
