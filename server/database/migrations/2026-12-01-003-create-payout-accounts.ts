import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE payout_accounts (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_account_id VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
      details_submitted TINYINT(1) NOT NULL DEFAULT 0,
      transfers_active TINYINT(1) NOT NULL DEFAULT 0,
      payouts_enabled TINYINT(1) NOT NULL DEFAULT 0,
      requirements JSON NOT NULL,
      checked_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY payout_accounts_member (member_id),
      UNIQUE KEY payout_accounts_provider (provider_account_id),
      CONSTRAINT payout_accounts_member_fk FOREIGN KEY (member_id) REFERENCES members (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('payout_accounts');
};
