import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE laboratories (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      name VARCHAR(120) NOT NULL,
      accreditation_body VARCHAR(120) NOT NULL,
      accreditation_number VARCHAR(60) NOT NULL,
      scope VARCHAR(500) NOT NULL,
      region VARCHAR(60) NOT NULL,
      contact VARCHAR(254) NOT NULL,
      valid_until DATE NOT NULL,
      is_active TINYINT(1) NOT NULL DEFAULT 1,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY laboratories_accreditation (accreditation_body, accreditation_number)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('laboratories');
};
