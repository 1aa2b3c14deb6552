import { inject } from 'vitest';
import { query } from './database.ts';

type Books = { balances: Record<string, number>; sum: number; differences: unknown[] };

type Sum = { kind: string; providerAccountId: string | null; cents: string };

/** Sums of our own ledger, in cents: of each kind, and of each member's account at the provider. */
async function ourSums(): Promise<Sum[]> {
  return query<Sum>(
    `SELECT a.kind, p.provider_account_id AS providerAccountId, CAST(SUM(e.amount_minor) AS CHAR) AS cents
       FROM ledger_entries e
       JOIN ledger_accounts a ON a.id = e.account_id
       LEFT JOIN payout_accounts p ON a.kind = 'member_connected' AND p.member_id = a.owner_id
      GROUP BY a.kind, p.provider_account_id`,
  );
}

const cents = (books: Books, account: string) => String(books.balances[account] ?? 0);

/**
 * Both books side by side, in cents: what the provider holds for the house, what it has kept as fees, and what lies on each
 * seller's account there. `house` is the difference between our own debits and credits.
 */
export async function compareBooks() {
  const books = (await (await fetch(`${inject('paymentsUrl')}/control/books`)).json()) as Books;
  const sums = await ourSums();
  const of = (kind: string) => sums.find((sum) => sum.kind === kind)?.cents ?? '0';
  const connected = sums.filter((sum) => sum.kind === 'member_connected');
  return {
    ours: {
      provider: of('provider'),
      fees: of('provider_fees'),
      connected: Object.fromEntries(connected.map((sum) => [sum.providerAccountId, sum.cents])),
      total: sums.reduce((total, sum) => total + BigInt(sum.cents), 0n).toString(),
    },
    theirs: {
      provider: cents(books, 'platform'),
      fees: cents(books, 'provider:fees'),
      connected: Object.fromEntries(
        connected.map(({ providerAccountId }) => [providerAccountId, cents(books, providerAccountId ?? '')]),
      ),
      total: String(books.sum),
    },
    differences: books.differences,
  };
}

/** The entries of one deal: kind of journal, kind of account, signed cents. */
export async function dealEntries(code: string): Promise<[string, string, string][]> {
  const rows = await query<{ journal: string; account: string; cents: string }>(
    `SELECT j.kind AS journal, a.kind AS account, CAST(e.amount_minor AS CHAR) AS cents
       FROM ledger_entries e
       JOIN ledger_journals j ON j.id = e.journal_id
       JOIN ledger_accounts a ON a.id = e.account_id
       JOIN deals d ON d.id = j.deal_id
      WHERE d.code = ?
      ORDER BY FIELD(j.kind, 'funding', 'provider_fee', 'settlement', 'transfer', 'payout'), e.amount_minor DESC`,
    [code],
  );
  return rows.map(({ journal, account, cents }) => [journal, account, cents]);
}
