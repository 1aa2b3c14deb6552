import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE deal_sheets (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      moment VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (moment IN ('provisional', 'final')),
      engine_version VARCHAR(16) NOT NULL,
      input JSON NOT NULL,
      buyer_sheet JSON NOT NULL,
      seller_sheet JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY deal_sheets_moment (deal_id, moment),
      CONSTRAINT deal_sheets_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('deal_sheets');
};
