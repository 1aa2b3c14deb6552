import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE ledger_entries (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      journal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      account_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      amount_minor BIGINT NOT NULL CHECK (amount_minor <> 0),
      currency CHAR(3) NOT NULL CHECK (currency = 'USD'),
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY ledger_entries_once (journal_id, account_id),
      KEY ledger_entries_account (account_id),
      CONSTRAINT ledger_entries_journal_fk FOREIGN KEY (journal_id) REFERENCES ledger_journals (id),
      CONSTRAINT ledger_entries_account_fk FOREIGN KEY (account_id) REFERENCES ledger_accounts (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('ledger_entries');
};
