import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE certificates (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      assay_version INT NOT NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('submitted', 'claimed', 'verified', 'examined', 'returned', 'superseded')),
      file_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      laboratory_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      laboratory_name VARCHAR(120) NOT NULL,
      number VARCHAR(60) NOT NULL,
      issued_on DATE NOT NULL,
      sampling VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (sampling IN ('laboratory', 'whole_piece', 'customer', 'not_stated')),
      item_mass_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NULL,
      item_mass_unit VARCHAR(8) NULL,
      item_mass_grams DECIMAL(30,15) NULL,
      item_mark VARCHAR(120) NULL,
      report_fields JSON NOT NULL,
      sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      live_key VARCHAR(200) NULL,
      live_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin AS (IF(live_key IS NULL, NULL, RTRIM(sha256))) STORED,
      claimed_by_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      claimed_at DATETIME(3) NULL,
      decided_by_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      decided_at DATETIME(3) NULL,
      confirmed_how VARCHAR(500) NULL,
      confirmed_with VARCHAR(200) NULL,
      confirmed_on DATE NULL,
      grade VARCHAR(16) NULL CHECK (grade IN ('certified', 'examined', 'declared')),
      return_reason VARCHAR(1000) NULL,
      submitted_at DATETIME(3) NOT NULL,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY certificates_live (live_key),
      UNIQUE KEY certificates_live_file (live_sha256),
      UNIQUE KEY certificates_lot_version (lot_id, assay_version),
      KEY certificates_queue (state, submitted_at),
      KEY certificates_number (number),
      KEY certificates_sha256 (sha256),
      CONSTRAINT certificates_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id),
      CONSTRAINT certificates_file_fk FOREIGN KEY (file_id) REFERENCES files (id),
      CONSTRAINT certificates_laboratory_fk FOREIGN KEY (laboratory_id) REFERENCES laboratories (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('certificates');
};
