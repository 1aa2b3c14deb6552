import type { Migration } from '../migrate.ts';

/** While a fix is open it names its member and its lot in two UNIQUE columns: one fix a member, one a lot. */
export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    CREATE TABLE price_fixes (
      id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
      member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
      state VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL CHECK (state IN ('open', 'used', 'ran_out', 'given_up')),
      open_member_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      open_lot_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      percent DECIMAL(8,4) NOT NULL CHECK (percent > 0),
      price_minor BIGINT NOT NULL CHECK (price_minor > 0),
      quotes JSON NOT NULL,
      fixed_at DATETIME(3) NOT NULL,
      fixed_until DATETIME(3) NOT NULL,
      ended_at DATETIME(3) NULL,
      deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      UNIQUE KEY price_fixes_open_member (open_member_id),
      UNIQUE KEY price_fixes_open_lot (open_lot_id),
      KEY price_fixes_again (member_id, lot_id, fixed_at),
      KEY price_fixes_due (state, fixed_until),
      CONSTRAINT price_fixes_open CHECK (
        (state = 'open') = (open_member_id IS NOT NULL) AND (state = 'open') = (open_lot_id IS NOT NULL)
        AND (state = 'open') = (ended_at IS NULL)
      ),
      CONSTRAINT price_fixes_used CHECK ((state = 'used') = (deal_id IS NOT NULL)),
      CONSTRAINT price_fixes_member_fk FOREIGN KEY (member_id) REFERENCES members (id),
      CONSTRAINT price_fixes_lot_fk FOREIGN KEY (lot_id) REFERENCES lots (id),
      CONSTRAINT price_fixes_deal_fk FOREIGN KEY (deal_id) REFERENCES deals (id)
    ) ENGINE=InnoDB
  `);
};

export const down: Migration = async ({ context }) => {
  await context.dropTable('price_fixes');
};
