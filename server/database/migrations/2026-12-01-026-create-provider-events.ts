import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE provider_events (
      id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      type VARCHAR(80) NOT NULL,
      object_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      account_id VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
      provider_created_at DATETIME(3) NOT NULL,
      received_at DATETIME(3) NOT NULL,
      deliveries INT NOT NULL DEFAULT 1,
      outcome VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (outcome IN ('applied', 'no_effect', 'ignored')),
      created_at DATETIME(3) NOT NULL,
      KEY provider_events_object (object_id, type)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('provider_events');
};
