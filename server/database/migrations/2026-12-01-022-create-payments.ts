import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE payments (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_session_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      session_url VARCHAR(2000) NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('starting', 'open', 'paid', 'expired')),
      payment_intent_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      charge_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      balance_transaction_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      attempt INT NOT NULL DEFAULT 1,
      amount_minor BIGINT NOT NULL CHECK (amount_minor > 0),
      fee_minor BIGINT NULL CHECK (fee_minor >= 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      expires_at DATETIME(3) NOT NULL,
      paid_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY payments_deal (deal_id),
      UNIQUE KEY payments_session (provider_session_id),
      UNIQUE KEY payments_charge (charge_id),
      CONSTRAINT payments_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('payments');
};
