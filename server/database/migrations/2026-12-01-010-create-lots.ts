import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE lots (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      code VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      seller_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('draft', 'submitted', 'returned', 'open', 'reserved', 'sold', 'paused', 'closed', 'withdrawn')),
      draft JSON NOT NULL,
      draft_version INT NOT NULL DEFAULT 0,
      form VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NULL CHECK (form IN ('button', 'bar', 'grain', 'karat_scrap', 'plated_scrap', 'e_scrap', 'sweeps')),
      title VARCHAR(120) NULL,
      description TEXT NULL,
      region VARCHAR(60) NOT NULL,
      gross_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NULL,
      gross_unit VARCHAR(8) NULL,
      gross_grams DECIMAL(30,15) NULL CHECK (gross_grams > 0),
      readability_value VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NULL,
      readability_unit VARCHAR(8) NULL,
      pricing_basis VARCHAR(16) NOT NULL DEFAULT 'outright' CHECK (pricing_basis IN ('outright', 'linked', 'ascending', 'tender')),
      settles_on VARCHAR(16) NOT NULL DEFAULT 'stated' CHECK (settles_on IN ('stated', 'final')),
      price_minor BIGINT NULL CHECK (price_minor > 0),
      shipping_minor BIGINT NULL CHECK (shipping_minor >= 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      destinations JSON NOT NULL,
      evidence_grade VARCHAR(16) NOT NULL DEFAULT 'declared' CHECK (evidence_grade IN ('certified', 'examined', 'declared')),
      assay_version INT NOT NULL DEFAULT 0,
      main_metal VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NULL CHECK (main_metal IN ('Au', 'Ag', 'Pt', 'Pd')),
      main_fineness_permille DECIMAL(20,12) NULL,
      main_fine_grams DECIMAL(30,15) NULL,
      rank_price DECIMAL(30,8) NULL,
      confirmed_at DATETIME(3) NULL,
      rules_version VARCHAR(16) NULL,
      submitted_at DATETIME(3) NULL,
      opened_at DATETIME(3) NULL,
      closes_at DATETIME(3) NULL,
      ended_at DATETIME(3) NULL,
      state_reason VARCHAR(1000) NULL,
      pulled_by_desk TINYINT(1) NOT NULL DEFAULT 0,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY lots_code (code),
      KEY lots_seller (seller_id, state),
      KEY lots_newest (state, opened_at, id),
      KEY lots_rank (state, main_metal, rank_price, id),
      KEY lots_fine (state, main_metal, main_fine_grams, id),
      KEY lots_closing (state, closes_at),
      CONSTRAINT lots_seller_fk FOREIGN KEY (seller_id) REFERENCES members (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('lots');
};
