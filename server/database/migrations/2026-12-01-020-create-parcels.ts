import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE parcels (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      carrier VARCHAR(40) NOT NULL,
      tracking_number VARCHAR(60) NOT NULL,
      insured_minor BIGINT NOT NULL CHECK (insured_minor > 0),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      tracker_status VARCHAR(20) NOT NULL DEFAULT 'registered',
      registered_at DATETIME(3) NULL,
      delivered_at DATETIME(3) NULL,
      is_signed TINYINT(1) NULL,
      signed_by VARCHAR(120) NULL,
      checked_at DATETIME(3) NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY parcels_deal (deal_id),
      UNIQUE KEY parcels_tracking (carrier, tracking_number),
      CONSTRAINT parcels_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('parcels');
};
