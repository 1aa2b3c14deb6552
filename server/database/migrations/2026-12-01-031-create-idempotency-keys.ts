import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE idempotency_keys (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      actor_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      operation VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      idempotency_key VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      input_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      status INT NOT NULL,
      answer JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY idempotency_keys_once (actor_id, operation, idempotency_key),
      KEY idempotency_keys_age (created_at)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('idempotency_keys');
};
