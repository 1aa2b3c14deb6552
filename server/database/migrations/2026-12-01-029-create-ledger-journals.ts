import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE ledger_journals (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (kind IN ('funding', 'provider_fee', 'settlement', 'transfer', 'payout', 'payout_returned', 'refund', 'reversal')),
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      unique_key VARCHAR(160) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_object_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      reverses_journal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      memo VARCHAR(200) NOT NULL,
      at DATETIME(3) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY ledger_journals_key (unique_key),
      UNIQUE KEY ledger_journals_reverses (reverses_journal_id),
      KEY ledger_journals_deal (deal_id, at)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('ledger_journals');
};
