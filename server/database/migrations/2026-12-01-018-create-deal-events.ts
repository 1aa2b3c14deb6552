import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE deal_events (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      sequence INT NOT NULL,
      act VARCHAR(40) NOT NULL,
      actor_kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (actor_kind IN ('buyer', 'seller', 'desk', 'provider', 'carrier', 'clock', 'house')),
      actor_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      at DATETIME(3) NOT NULL,
      from_state VARCHAR(32) NULL,
      to_state VARCHAR(32) NULL,
      held_minor BIGINT NOT NULL,
      detail JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY deal_events_sequence (deal_id, sequence),
      CONSTRAINT deal_events_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('deal_events');
};
