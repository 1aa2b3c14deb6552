import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE lot_events (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      act VARCHAR(40) NOT NULL,
      actor_kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (actor_kind IN ('seller', 'buyer', 'desk', 'house')),
      actor_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      at DATETIME(3) NOT NULL,
      from_state VARCHAR(32) NULL,
      to_state VARCHAR(32) NULL,
      detail JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY lot_events_lot (lot_id, at),
      CONSTRAINT lot_events_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('lot_events');
};
