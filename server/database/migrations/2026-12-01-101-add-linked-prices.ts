import type { Migration } from '../migrate.ts';

/** A linked lot is ranked by its percentage itself; the column of the metal stands last, for the filter by metal. */
export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    ALTER TABLE lots
      ADD COLUMN linked_percent DECIMAL(8,4) NULL CHECK (linked_percent > 0) AFTER price_minor,
      ADD COLUMN floor_percent DECIMAL(8,4) NULL CHECK (floor_percent > 0) AFTER linked_percent,
      ADD CONSTRAINT lots_one_price CHECK (price_minor IS NULL OR linked_percent IS NULL),
      ADD CONSTRAINT lots_linked_only CHECK (linked_percent IS NULL OR pricing_basis = 'linked'),
      ADD CONSTRAINT lots_floor_outright CHECK (floor_percent IS NULL OR pricing_basis = 'outright'),
      ADD KEY lots_linked (state, linked_percent, id, main_metal),
      ADD KEY lots_floor (state, floor_percent)
  `);
};

export const down: Migration = async ({ context }) => {
  await context.sequelize.query(`
    ALTER TABLE lots
      DROP KEY lots_floor,
      DROP KEY lots_linked,
      DROP CONSTRAINT lots_floor_outright,
      DROP CONSTRAINT lots_linked_only,
      DROP CONSTRAINT lots_one_price,
      DROP COLUMN floor_percent,
      DROP COLUMN linked_percent
  `);
};
