import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE day_rates (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      metal VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (metal IN ('Au', 'Ag', 'Pt', 'Pd')),
      day DATE NOT NULL,
      quote_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      usd_per_troy_ounce DECIMAL(20,8) NOT NULL CHECK (usd_per_troy_ounce > 0),
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY day_rates_day (metal, day),
      CONSTRAINT day_rates_quote_fk FOREIGN KEY (quote_id) REFERENCES quotes (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('day_rates');
};
