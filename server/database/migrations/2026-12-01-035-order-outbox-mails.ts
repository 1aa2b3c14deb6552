import type { Migration } from '../migrate.ts';

/** Mails of one deal to one reader go out in their order, and those that have been overtaken are dropped. */
export const up: Migration = async ({ context }) => {
  await context.sequelize.query(`
    ALTER TABLE outbox_mails
      ADD COLUMN deal_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL AFTER member_id,
      MODIFY COLUMN state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL
        CHECK (state IN ('due', 'claimed', 'sent', 'dead', 'superseded')),
      ADD KEY outbox_mails_deal (deal_id, member_id, state)
  `);
};

export const down: Migration = async ({ context }) => {
  await context.sequelize.query(`
    ALTER TABLE outbox_mails
      DROP KEY outbox_mails_deal,
      DROP COLUMN deal_id,
      MODIFY COLUMN state VARCHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL
        CHECK (state IN ('due', 'claimed', 'sent', 'dead'))
  `);
};
