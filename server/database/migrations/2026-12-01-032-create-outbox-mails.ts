import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE outbox_mails (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      mail VARCHAR(40) NOT NULL,
      member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      recipient VARCHAR(254) NOT NULL,
      unique_key VARCHAR(160) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      input JSON NOT NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('due', 'claimed', 'sent', 'dead')),
      lease_token BIGINT NOT NULL DEFAULT 0,
      lease_until DATETIME(3) NULL,
      tries INT NOT NULL DEFAULT 0,
      next_at DATETIME(3) NOT NULL,
      accepted_at DATETIME(3) NULL,
      last_error VARCHAR(500) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY outbox_mails_once (unique_key),
      KEY outbox_mails_due (state, next_at)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('outbox_mails');
};
