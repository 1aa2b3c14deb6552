import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE deal_receipts (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      mass_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      mass_unit VARCHAR(8) NOT NULL,
      mass_grams DECIMAL(30,15) NOT NULL CHECK (mass_grams > 0),
      photo_file_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      recorded_at DATETIME(3) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY deal_receipts_deal (deal_id),
      CONSTRAINT deal_receipts_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('deal_receipts');
};
