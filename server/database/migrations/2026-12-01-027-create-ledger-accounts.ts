import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE ledger_accounts (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (kind IN ('provider', 'escrow', 'member_payable', 'member_connected', 'commission', 'provider_fees')),
      owner_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      currency CHAR(3) NOT NULL CHECK (currency = 'USD'),
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY ledger_accounts_owner (kind, owner_id, currency)
    ) ENGINE=InnoDB
  `);
  await context.sequelize.query(`INSERT INTO ledger_accounts (id, kind, owner_id, currency, created_at) VALUES
      ('00000000-0000-7000-8000-00000000a001', 'provider', '00000000-0000-7000-8000-000000000000', 'USD', NOW(3)),
      ('00000000-0000-7000-8000-00000000a002', 'commission', '00000000-0000-7000-8000-000000000000', 'USD', NOW(3)),
      ('00000000-0000-7000-8000-00000000a003', 'provider_fees', '00000000-0000-7000-8000-000000000000', 'USD', NOW(3))`);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('ledger_accounts');
};
