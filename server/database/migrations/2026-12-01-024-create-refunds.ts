import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE refunds (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      provider_refund_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      amount_minor BIGINT NOT NULL CHECK (amount_minor > 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('due', 'sent', 'succeeded', 'failed')),
      reason VARCHAR(60) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY refunds_deal (deal_id),
      UNIQUE KEY refunds_provider (provider_refund_id),
      CONSTRAINT refunds_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('refunds');
};
