import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { Check } from './check.ts';

const BREACHES = [
  `SELECT CONCAT('deal ', d.code, ' has ', COUNT(*), ' journals of kind ', j.kind) AS breach
     FROM ledger_journals j JOIN deals d ON d.id = j.deal_id
    WHERE j.kind IN ('funding', 'provider_fee', 'settlement', 'transfer', 'refund')
    GROUP BY d.code, j.kind HAVING COUNT(*) > 1`,
  `SELECT CONCAT('deal ', d.code, ' was both released and refunded') AS breach
     FROM deals d
    WHERE EXISTS (SELECT 1 FROM ledger_journals j WHERE j.deal_id = d.id AND j.kind = 'settlement')
      AND EXISTS (SELECT 1 FROM refunds r WHERE r.deal_id = d.id)`,
  `SELECT CONCAT('deal ', d.code, ' has ', COUNT(*), ' payouts more than came back') AS breach
     FROM ledger_journals j JOIN deals d ON d.id = j.deal_id
    WHERE j.kind = 'payout'
      AND NOT EXISTS (SELECT 1 FROM ledger_journals r WHERE r.reverses_journal_id = j.id)
    GROUP BY d.code HAVING COUNT(*) > 1`,
];

/** Money leaves a deal once: one release or one refund, one transfer, one payout that stays. */
export const singleReleaseCheck: Check = {
  name: 'single-release',
  states: 'A deal is funded once and its money leaves once: to the seller or back to the buyer.',
  async find() {
    const found: string[] = [];
    for (const sql of BREACHES) {
      const rows = await sequelize.query<{ breach: string }>(sql, { type: QueryTypes.SELECT });
      found.push(...rows.map(({ breach }) => breach));
    }
    return found;
  },
};
