import { expect, it } from 'vitest';
import { Deal } from '#server/models/index.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { startStory } from '#tests/helpers/deal-story.ts';
import { dealLedgerTable } from '#tests/helpers/ledger-table.ts';

const story = await startStory();

/** Nothing goes to the seller; the provider's fee of 2.9 % of 4,024.99 and 30 cents stays with the house. */
const BOOKS = `
what          account            debit   credit
funding       at the provider  4024.99
              held in escrow            4024.99
provider fee  provider fees     117.02
              at the provider            117.02
refund        held in escrow   4024.99
              at the provider           4024.99
`.trim();

it('a button weighs less than stated: the buyer contests, the desk refunds in full', async () => {
  const seller = await story.payments.seller();
  const buyer = await buildMember();
  const lot = await buildLot({ sellerId: seller.id, price: '3999.99' });
  const atTheBench = await story.signIn(seller);
  const atTheBuyers = await story.signIn(buyer);
  const atTheDesk = await story.signIn(await buildMember({ role: 'desk' }));

  const code = await story.buys(atTheBuyers, lot);
  await story.paysByCard(atTheBuyers, code);
  const parcel = { carrier: 'Vale Post', trackingNumber: 'VP 7701 4410', insuredValue: '4000.00' };
  await story.act(atTheBench, code, 'ship', parcel);
  await story.jobsRun();
  await story.carrierDelivers(parcel.trackingNumber);
  await story.jobsRun();
  await story.becomes(atTheBuyers, code, 'delivered');

  const weighed = await story.act(atTheBuyers, code, 'receipt', { mass: { value: '29.14', unit: 'g' } });
  expect(weighed.receipt).toMatchObject({ differenceGrams: '-2.06', isWithinScales: false });
  const note = 'It weighs 29.14 g on a checked balance, not 31.20 g.';
  const contested = await story.act(atTheBuyers, code, 'contest', { reason: 'wrong_mass', note });
  expect(contested).toMatchObject({ state: 'contested', held: { amount: '4024.99' } });

  const ruling = { ruling: 'refund', reason: 'The photographs of the balance show the lower mass.' };
  await atTheDesk
    .post(`/api/v1/desk/deals/${code}/ruling`, ruling, { 'Idempotency-Key': `ruling:${code}` })
    .expect(200);
  await story.jobsRun();
  await story.jobsRun();
  const ended = await story.becomes(atTheBuyers, code, 'cancelled');
  expect(ended).toMatchObject({ held: { amount: '0.00' }, refund: { state: 'succeeded' }, payout: null });
  expect(ended.events.map(({ act }) => act)).toEqual(expect.arrayContaining(['contested', 'ruled-refund']));
  for (const side of [seller, buyer]) {
    const subjects = (await story.mailbox(side)).map(({ subject }) => subject);
    expect(subjects).toContain('The desk has ruled: Button from the bench');
  }

  const { id } = await Deal.findOne({ where: { code }, rejectOnEmpty: true });
  expect(await dealLedgerTable(id)).toBe(BOOKS);
  await story.booksAgree(seller);
});
