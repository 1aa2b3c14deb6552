import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE certificate_results (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      certificate_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      position INT NOT NULL,
      element VARCHAR(4) NOT NULL,
      fineness_permille DECIMAL(20,12) NOT NULL CHECK (fineness_permille > 0 AND fineness_permille <= 1000),
      uncertainty_permille DECIMAL(20,12) NULL,
      method VARCHAR(32) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY certificate_results_element (certificate_id, element),
      CONSTRAINT certificate_results_certificate_fk FOREIGN KEY (certificate_id) REFERENCES certificates (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('certificate_results');
};
