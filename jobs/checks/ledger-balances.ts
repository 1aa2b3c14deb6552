import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Check } from './check.ts';

/** Each query answers one row for each breach, with a sentence. */
const BREACHES = [
  `SELECT CONCAT('journal ', journal_id, ' sums to ', SUM(amount_minor)) AS breach
     FROM ledger_entries GROUP BY journal_id, currency HAVING SUM(amount_minor) <> 0`,
  `SELECT CONCAT('journal ', j.id, ' has ', COUNT(e.id), ' entries') AS breach
     FROM ledger_journals j LEFT JOIN ledger_entries e ON e.journal_id = j.id
    GROUP BY j.id HAVING COUNT(e.id) < 2`,
  `SELECT CONCAT('entry ', e.id, ' is not in the currency of its account') AS breach
     FROM ledger_entries e JOIN ledger_accounts a ON a.id = e.account_id WHERE e.currency <> a.currency`,
  `SELECT CONCAT('the whole ledger sums to ', SUM(amount_minor), ' ', currency) AS breach
     FROM ledger_entries GROUP BY currency HAVING SUM(amount_minor) <> 0`,
  `SELECT CONCAT('balance of account ', b.account_id, ' is ', b.amount_minor, ', its entries sum to ',
                 COALESCE(SUM(e.amount_minor), 0)) AS breach
     FROM ledger_balances b LEFT JOIN ledger_entries e ON e.account_id = b.account_id
    GROUP BY b.account_id, b.amount_minor HAVING b.amount_minor <> COALESCE(SUM(e.amount_minor), 0)`,
  `SELECT CONCAT('escrow account ', account_id, ' is overdrawn') AS breach
     FROM ledger_balances WHERE kind = 'escrow' AND amount_minor > 0`,
  `SELECT CONCAT('account ', a.id, ' (', a.kind, ') has no balance row') AS breach
     FROM ledger_accounts a LEFT JOIN ledger_balances b ON b.account_id = a.id
    WHERE a.kind IN ('escrow', 'member_payable', 'member_connected') AND b.account_id IS NULL`,
];

/** Journals and the whole ledger sum to zero; kept balances are the sum of their entries; escrow is never overdrawn. */
export const ledgerBalancesCheck: Check = {
  name: 'ledger-balances',
  states: 'Every journal and the whole ledger sum to zero, and every kept balance is the sum of its entries.',
  async find() {
    const found: string[] = [];
    for (const sql of BREACHES) {
      const rows = await sequelize.query<{ breach: string }>(sql, { type: QueryTypes.SELECT });
      found.push(...rows.map(({ breach }) => breach));
    }
    return found;
  },
};
