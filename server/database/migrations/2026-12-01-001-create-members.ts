import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE members (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      email VARCHAR(254) NOT NULL,
      password_hash VARCHAR(255) NOT NULL,
      display_name VARCHAR(80) NOT NULL,
      role VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (role IN ('member', 'desk', 'lab', 'admin')),
      region VARCHAR(60) NOT NULL,
      weight_unit VARCHAR(8) NOT NULL DEFAULT 'g' CHECK (weight_unit IN ('g', 'ozt', 'dwt', 'gr')),
      time_zone VARCHAR(64) NOT NULL DEFAULT 'UTC',
      suspended_at DATETIME(3) NULL,
      suspension_reason VARCHAR(500) NULL,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY members_email (email)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('members');
};
