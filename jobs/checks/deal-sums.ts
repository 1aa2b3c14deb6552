import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Check } from './check.ts';

/**
 * Of each deal: what came in is what was released (to the seller and as commission), what was refunded and what is still
 * held; the payment row says the same as the books, and the settlement as the deal's own figures.
 */
export const dealSumsCheck: Check = {
  name: 'deal-sums',
  states: 'Of each deal: taken in = released + refunded + still held, and the books agree with the rows.',
  async find() {
    const rows = await sequelize.query<{ breach: string }>(
      `WITH sums AS (
         SELECT j.deal_id,
                SUM(IF(j.kind = 'funding' AND a.kind = 'escrow', -e.amount_minor, 0)) AS taken,
                SUM(IF(j.kind = 'settlement' AND a.kind = 'escrow', e.amount_minor, 0)) AS released,
                SUM(IF(j.kind = 'settlement' AND a.kind = 'commission', -e.amount_minor, 0)) AS commission,
                SUM(IF(j.kind IN ('refund', 'reversal') AND a.kind = 'escrow', e.amount_minor, 0)) AS refunded,
                SUM(IF(j.kind = 'provider_fee' AND a.kind = 'provider_fees', e.amount_minor, 0)) AS fee
           FROM ledger_journals j
           JOIN ledger_entries e ON e.journal_id = j.id
           JOIN ledger_accounts a ON a.id = e.account_id
          WHERE j.deal_id IS NOT NULL GROUP BY j.deal_id)
       SELECT CONCAT('deal ', d.code, ': taken ', s.taken, ', released ', s.released, ', refunded ', s.refunded,
                     ', held ', -b.amount_minor, ', commission ', s.commission, ', fee ', s.fee) AS breach
         FROM sums s
         JOIN deals d ON d.id = s.deal_id
         JOIN ledger_accounts a ON a.kind = 'escrow' AND a.owner_id = d.id
         JOIN ledger_balances b ON b.account_id = a.id
         LEFT JOIN payments p ON p.deal_id = d.id
        WHERE s.taken <> s.released + s.refunded - b.amount_minor
           OR s.taken NOT IN (0, d.total_minor)
           OR (s.released <> 0 AND (s.released <> d.total_minor OR s.commission <> d.commission_minor))
           OR s.taken <> IF(p.state = 'paid', p.amount_minor, 0)
           OR s.fee <> COALESCE(IF(p.state = 'paid', p.fee_minor, 0), 0)`,
      { type: QueryTypes.SELECT },
    );
    return rows.map(({ breach }) => breach);
  },
};
