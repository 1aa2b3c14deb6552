import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Check } from './check.ts';

/** Nothing is held for a deal that has ended or was released, but for what a refund that is on its way will take. */
export const escrowEndedCheck: Check = {
  name: 'escrow-ended',
  states: 'Nothing is held for a deal that was released or has ended, unless its refund is on its way.',
  async find() {
    const rows = await sequelize.query<{ breach: string }>(
      `SELECT CONCAT('deal ', d.code, ' is ', d.state, ' and ', -b.amount_minor, ' minor units are held') AS breach
         FROM deals d
         JOIN ledger_accounts a ON a.kind = 'escrow' AND a.owner_id = d.id
         JOIN ledger_balances b ON b.account_id = a.id
         LEFT JOIN refunds r ON r.deal_id = d.id
        WHERE d.state IN ('settled', 'paid_out', 'lapsed', 'cancelled', 'returned', 'reversed')
          AND b.amount_minor <> 0 AND (r.id IS NULL OR r.state <> 'due')`,
      { type: QueryTypes.SELECT },
    );
    return rows.map(({ breach }) => breach);
  },
};
