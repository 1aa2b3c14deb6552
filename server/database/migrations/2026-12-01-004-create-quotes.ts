import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE quotes (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      metal VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (metal IN ('Au', 'Ag', 'Pt', 'Pd')),
      usd_per_troy_ounce DECIMAL(20,8) NOT NULL CHECK (usd_per_troy_ounce > 0),
      bid DECIMAL(20,8) NULL,
      ask DECIMAL(20,8) NULL,
      source VARCHAR(60) NOT NULL,
      quoted_at DATETIME(3) NOT NULL,
      accepted_at DATETIME(3) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY quotes_reading (metal, quoted_at, source),
      KEY quotes_newest (metal, accepted_at)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('quotes');
};
