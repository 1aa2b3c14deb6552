import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE ledger_balances (
      account_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (kind IN ('escrow', 'member_payable', 'member_connected')),
      amount_minor BIGINT NOT NULL DEFAULT 0,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      CONSTRAINT ledger_balances_escrow CHECK (kind <> 'escrow' OR amount_minor <= 0),
      CONSTRAINT ledger_balances_account_fk FOREIGN KEY (account_id) REFERENCES ledger_accounts (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('ledger_balances');
};
