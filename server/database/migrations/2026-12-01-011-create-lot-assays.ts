import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE lot_assays (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      assay_version INT NOT NULL,
      position INT NOT NULL,
      element VARCHAR(4) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      fineness_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      fineness_unit VARCHAR(12) NOT NULL,
      fineness_permille DECIMAL(20,12) NOT NULL CHECK (fineness_permille > 0 AND fineness_permille <= 1000),
      uncertainty_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NULL,
      uncertainty_unit VARCHAR(12) NULL,
      uncertainty_permille DECIMAL(20,12) NOT NULL CHECK (uncertainty_permille >= 0),
      is_uncertainty_assumed TINYINT(1) NOT NULL,
      method VARCHAR(32) NOT NULL,
      is_paid_for TINYINT(1) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY lot_assays_element (lot_id, assay_version, element),
      CONSTRAINT lot_assays_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('lot_assays');
};
