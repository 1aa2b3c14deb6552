import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE quote_candidates (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      metal VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (metal IN ('Au', 'Ag', 'Pt', 'Pd')),
      usd_per_troy_ounce DECIMAL(20,8) NOT NULL CHECK (usd_per_troy_ounce > 0),
      first_seen_at DATETIME(3) NOT NULL,
      polls INT NOT NULL DEFAULT 1,
      confirmations INT NOT NULL DEFAULT 0,
      admin_told_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY quote_candidates_metal (metal)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('quote_candidates');
};
