import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE quote_polls (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      polled_at DATETIME(3) NOT NULL,
      outcome VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (outcome IN ('accepted', 'partly', 'refused', 'unreachable')),
      market_open TINYINT(1) NULL,
      market_until DATETIME(3) NULL,
      detail JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY quote_polls_newest (polled_at)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('quote_polls');
};
