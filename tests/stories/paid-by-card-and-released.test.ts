import { expect, it } from 'vitest';
import { Deal } from '#server/models/index.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startStory } from '#tests/helpers/deal-story.ts';
import { dealLedgerTable } from '#tests/helpers/ledger-table.ts';

const story = await startStory();

/** 4 % of 4,050.00 is 162.00; the provider keeps 2.9 % of 4,075.00 and 30 cents, which the house bears. */
const BOOKS = `
what          account                      debit   credit
funding       at the provider            4075.00
              held in escrow                      4075.00
provider fee  provider fees               118.48
              at the provider                      118.48
settlement    held in escrow             4075.00
              commission                           162.00
              owed to the seller                  3913.00
transfer      seller's provider account  3913.00
              at the provider                     3913.00
payout        owed to the seller         3913.00
              seller's provider account           3913.00
`.trim();

it('a button is bought, paid by card, shipped, weighed, accepted and paid out', async () => {
  const seller = await story.payments.seller();
  const buyer = await buildMember({ timeZone: 'America/Denver' });
  const lot = await buildLot({ sellerId: seller.id, price: '4050.00' });
  const atTheBench = await story.signIn(seller);
  const atTheBuyers = await story.signIn(buyer);

  const code = await story.buys(atTheBuyers, lot);
  await story.paysByCard(atTheBuyers, code);
  expect((await story.read(atTheBench, code)).held.amount).toBe('4075.00');

  const parcel = { carrier: 'Vale Post', trackingNumber: 'VP 5512 9034', insuredValue: '4050.00' };
  await story.act(atTheBench, code, 'ship', parcel);
  await story.jobsRun();
  await story.carrierDelivers(parcel.trackingNumber);
  await story.jobsRun();
  await story.becomes(atTheBuyers, code, 'delivered');

  await story.act(atTheBuyers, code, 'receipt', { mass: { value: '31.20', unit: 'g' } });
  const accepted = await story.act(atTheBuyers, code, 'accept');
  expect(accepted).toMatchObject({ state: 'settled', held: { amount: '0.00' } });
  expect(accepted.finalSheet?.total).toBe('4075.00');

  await story.jobsRun();
  const ended = await story.becomes(atTheBench, code, 'paid_out');
  expect(ended.payout).toMatchObject({ state: 'paid', amount: { amount: '3913.00' } });
  await story.jobsRun();

  const subjects = (await story.mailbox(seller)).map(({ subject }) => subject);
  expect(subjects[0]).toBe('Paid out: US$ 3,913.00 for Button from the bench');
  expect((await story.mailbox(seller))[0]?.attachments[0]?.filename).toBe(`scruple-${code}-final.pdf`);
  expect((await story.mailbox(buyer))[0]?.attachments[0]?.filename).toBe(`scruple-${code}-final.pdf`);

  const { id } = await Deal.findOne({ where: { code }, rejectOnEmpty: true });
  expect(await dealLedgerTable(id)).toBe(BOOKS);
  await story.booksAgree(seller);
});
