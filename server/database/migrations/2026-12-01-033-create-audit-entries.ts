import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE audit_entries (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      actor_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      actor_role VARCHAR(16) NOT NULL,
      act VARCHAR(60) NOT NULL,
      subject_kind VARCHAR(32) NOT NULL,
      subject_id VARCHAR(120) NOT NULL,
      at DATETIME(3) NOT NULL,
      detail JSON NOT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY audit_entries_newest (at),
      KEY audit_entries_subject (subject_kind, subject_id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('audit_entries');
};
