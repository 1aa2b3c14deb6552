import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE files (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      owner_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      kind VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (kind IN ('photo', 'certificate', 'receipt_photo', 'sheet')),
      sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      media_type VARCHAR(60) NOT NULL,
      byte_count INT UNSIGNED NOT NULL,
      width INT UNSIGNED NULL,
      height INT UNSIGNED NULL,
      original_name VARCHAR(255) NOT NULL,
      storage_key VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY files_storage (storage_key),
      KEY files_sha256 (sha256, kind),
      CONSTRAINT files_owner_fk FOREIGN KEY (owner_id) REFERENCES members (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('files');
};
