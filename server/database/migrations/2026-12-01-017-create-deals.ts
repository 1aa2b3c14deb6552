import type { Migration } from '../migrate.ts';

export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE deals (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      code VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      seller_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      buyer_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('agreed', 'funded', 'shipped', 'delivered', 'accepted', 'settled', 'paid_out', 'lapsed', 'cancelled', 'contested', 'returning', 'returned', 'exchange', 'umpire', 'reversed')),
      live_lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      price_minor BIGINT NOT NULL CHECK (price_minor > 0),
      shipping_minor BIGINT NOT NULL CHECK (shipping_minor >= 0),
      total_minor BIGINT NOT NULL,
      commission_percent DECIMAL(8,4) NOT NULL,
      commission_minimum_minor BIGINT NOT NULL,
      commission_minor BIGINT NOT NULL CHECK (commission_minor >= 0 AND commission_minor <= price_minor),
      payment_method VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (payment_method IN ('card', 'bank_debit')),
      currency CHAR(3) NOT NULL DEFAULT 'USD' CHECK (currency = 'USD'),
      delivery_name VARCHAR(120) NOT NULL,
      delivery_line1 VARCHAR(120) NOT NULL,
      delivery_line2 VARCHAR(120) NOT NULL DEFAULT '',
      delivery_city VARCHAR(80) NOT NULL,
      delivery_postcode VARCHAR(20) NOT NULL,
      delivery_region VARCHAR(60) NOT NULL,
      delivery_country CHAR(2) CHARACTER SET ascii NOT NULL,
      delivery_phone VARCHAR(40) NOT NULL,
      rules_version VARCHAR(16) NOT NULL,
      agreed_at DATETIME(3) NOT NULL,
      fund_by DATETIME(3) NOT NULL,
      funded_at DATETIME(3) NULL,
      ship_by DATETIME(3) NULL,
      shipped_at DATETIME(3) NULL,
      arrive_by DATETIME(3) NULL,
      delivered_at DATETIME(3) NULL,
      inspect_by DATETIME(3) NULL,
      contested_at DATETIME(3) NULL,
      contest_reason VARCHAR(32) NULL,
      contest_note VARCHAR(1000) NULL,
      accepted_at DATETIME(3) NULL,
      settled_at DATETIME(3) NULL,
      paid_out_at DATETIME(3) NULL,
      ended_at DATETIME(3) NULL,
      end_reason VARCHAR(1000) NULL,
      frozen_at DATETIME(3) NULL,
      lock_version BIGINT NOT NULL DEFAULT 0,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY deals_code (code),
      UNIQUE KEY deals_live_lot (live_lot_id),
      KEY deals_buyer (buyer_id, state),
      KEY deals_seller (seller_id, state),
      KEY deals_state (state, fund_by),
      CONSTRAINT deals_total CHECK (total_minor = price_minor + shipping_minor),
      CONSTRAINT deals_live CHECK ((state IN ('lapsed', 'cancelled', 'returned', 'reversed')) = (live_lot_id IS NULL)),
      CONSTRAINT deals_two_sides CHECK (buyer_id <> seller_id),
      CONSTRAINT deals_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id),
      CONSTRAINT deals_seller_fk FOREIGN KEY (seller_id) REFERENCES members (id),
      CONSTRAINT deals_buyer_fk FOREIGN KEY (buyer_id) REFERENCES members (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('deals');
};
