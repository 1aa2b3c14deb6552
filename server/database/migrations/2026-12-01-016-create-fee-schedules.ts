import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE fee_schedules (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      payment_method VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (payment_method IN ('card', 'bank_debit')),
      percent DECIMAL(8,4) NOT NULL CHECK (percent >= 0 AND percent < 100),
      minimum_minor BIGINT NOT NULL CHECK (minimum_minor >= 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      valid_from DATETIME(3) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY fee_schedules_method (payment_method, valid_from)
    ) ENGINE=InnoDB
  `);
  await context.sequelize
    .query(`INSERT INTO fee_schedules (id, payment_method, percent, minimum_minor, currency, valid_from, created_at) VALUES
      ('00000000-0000-7000-8000-00000000f001', 'bank_debit', '1.5', 200, 'USD', '2026-01-01', NOW(3)),
      ('00000000-0000-7000-8000-00000000f002', 'card', '4', 200, 'USD', '2026-01-01', NOW(3))`);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('fee_schedules');
};
