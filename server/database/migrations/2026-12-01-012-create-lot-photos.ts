import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE lot_photos (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      file_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      position INT NOT NULL,
      caption VARCHAR(200) NOT NULL DEFAULT '',
      is_drawing TINYINT(1) NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY lot_photos_file (file_id),
      KEY lot_photos_order (lot_id, position),
      CONSTRAINT lot_photos_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id),
      CONSTRAINT lot_photos_file_fk FOREIGN KEY (file_id) REFERENCES files (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('lot_photos');
};
