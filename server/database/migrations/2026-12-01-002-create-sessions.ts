import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE sessions (
      sid VARCHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      expires DATETIME(3) NULL,
      data TEXT NULL,
      member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      KEY sessions_expires (expires),
      KEY sessions_member (member_id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('sessions');
};
