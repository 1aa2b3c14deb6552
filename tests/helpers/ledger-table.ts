import { minorToAmount } from '#shared/money.ts';
import { dealLedger, type LedgerLine } from '#server/features/ledger/ledger-queries.ts';

const ACCOUNT_NAMES: Record<LedgerLine['account'], string> = {
  provider: 'at the provider',
  escrow: 'held in escrow',
  member_payable: 'owed to the seller',
  member_connected: "seller's provider account",
  commission: 'commission',
  provider_fees: 'provider fees',
};

type Row = [what: string, account: string, debit: string, credit: string];

function rowsOf(lines: readonly LedgerLine[]): Row[] {
  return lines.map((line, index) => {
    const isFirst = lines[index - 1]?.journalId !== line.journalId;
    const sum = minorToAmount(line.amountMinor < 0n ? -line.amountMinor : line.amountMinor);
    return [
      isFirst ? line.kind.replaceAll('_', ' ') : '',
      ACCOUNT_NAMES[line.account],
      line.amountMinor > 0n ? sum : '',
      line.amountMinor < 0n ? sum : '',
    ];
  });
}

/**
 * The books of a deal as text, for a story to hold against:
 *
 *     what        account                    debit  credit
 *     funding     at the provider           850.00
 *                 held in escrow                    850.00
 */
export function ledgerTable(lines: readonly LedgerLine[]): string {
  const head: Row = ['what', 'account', 'debit', 'credit'];
  const rows = [head, ...rowsOf(lines)];
  const widths = head.map((_, column) => Math.max(...rows.map((row) => row[column]!.length)));
  return rows
    .map(([what, account, debit, credit]) =>
      [
        what.padEnd(widths[0]!),
        account.padEnd(widths[1]!),
        debit.padStart(widths[2]!),
        credit.padStart(widths[3]!),
      ]
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

/** The books of one deal, in the order in which they were written. */
export async function dealLedgerTable(dealId: string): Promise<string> {
  return ledgerTable(await dealLedger(dealId));
}
