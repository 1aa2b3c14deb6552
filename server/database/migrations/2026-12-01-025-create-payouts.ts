import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE payouts (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_account_id VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_transfer_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      provider_payout_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      attempt INT NOT NULL DEFAULT 1,
      amount_minor BIGINT NOT NULL CHECK (amount_minor >= 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('due', 'transferred', 'sent', 'paid', 'failed')),
      failure_code VARCHAR(60) NULL,
      paid_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY payouts_deal (deal_id),
      UNIQUE KEY payouts_transfer (provider_transfer_id),
      UNIQUE KEY payouts_provider (provider_payout_id),
      CONSTRAINT payouts_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id),
      CONSTRAINT payouts_member_fk FOREIGN KEY (member_id) REFERENCES members (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('payouts');
};
