import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE provider_tasks (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (kind IN ('expire_session', 'refund', 'refund_second', 'transfer', 'payout', 'register_parcel')),
      idempotency_key VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      key_version INT NOT NULL DEFAULT 1,
      key_since DATETIME(3) NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('due', 'claimed', 'done', 'given_up')),
      payload JSON NOT NULL,
      provider_object_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NULL,
      lease_owner VARCHAR(80) NULL,
      lease_until DATETIME(3) NULL,
      lease_token BIGINT NOT NULL DEFAULT 0,
      tries INT NOT NULL DEFAULT 0,
      next_at DATETIME(3) NOT NULL,
      last_error VARCHAR(500) NULL,
      done_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY provider_tasks_key (idempotency_key),
      KEY provider_tasks_due (state, next_at),
      KEY provider_tasks_deal (deal_id),
      CONSTRAINT provider_tasks_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('provider_tasks');
};
