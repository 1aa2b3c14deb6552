import { afterEach, expect, it } from 'vitest';
import { cancelUnshippedDeals } from '#jobs/cancel-unshipped-deals.ts';
import { databaseNow, pinDatabaseTime } from '#server/database/transaction.ts';
import { Deal, Lot } from '#server/models/index.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startStory } from '#tests/helpers/deal-story.ts';
import { dealLedgerTable } from '#tests/helpers/ledger-table.ts';

const story = await startStory();
afterEach(() => pinDatabaseTime(null));

/** The buyer gets all of it back; the provider keeps its fee, which the house bears. */
const BOOKS = `
what          account            debit   credit
funding       at the provider  1925.00
              held in escrow            1925.00
provider fee  provider fees      56.13
              at the provider             56.13
refund        held in escrow   1925.00
              at the provider           1925.00
`.trim();

it('a paid button is not shipped in time: the deal is cancelled and the buyer gets everything back', async () => {
  const seller = await story.payments.seller();
  const buyer = await buildMember();
  const lot = await buildLot({ sellerId: seller.id });
  const atTheBuyers = await story.signIn(buyer);
  const code = await story.buys(atTheBuyers, lot);
  await story.paysByCard(atTheBuyers, code);

  const { id, shipBy } = await Deal.findOne({ where: { code }, rejectOnEmpty: true });
  pinDatabaseTime(shipBy);
  expect(await cancelUnshippedDeals({ now: await databaseNow() })).toEqual({ cancelled: 1 });
  const cancelled = await story.read(atTheBuyers, code);
  expect(cancelled).toMatchObject({
    state: 'cancelled',
    held: { amount: '1925.00' },
    refund: { state: 'due' },
  });

  await story.jobsRun();
  await story.jobsRun();
  const ended = await story.becomes(atTheBuyers, code, 'cancelled');
  expect(ended).toMatchObject({ held: { amount: '0.00' }, refund: { state: 'succeeded' }, due: null });
  expect((await Lot.findByPk(lot.id))?.state).toBe('closed');
  const subjects = (await story.mailbox(buyer)).map(({ subject }) => subject);
  expect(subjects).toContain('Cancelled: Button from the bench');
  expect(subjects).toContain('Refunded: US$ 1,925.00 for Button from the bench');

  expect(await dealLedgerTable(id)).toBe(BOOKS);
  await story.booksAgree(seller);
});
