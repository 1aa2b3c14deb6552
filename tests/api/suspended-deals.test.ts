import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { Deal } from '#server/models/deal.ts';
import { Member } from '#server/models/member.ts';
import { buildDeal, deliver, DELIVERY, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildLot } from '#tests/factories/build-lot.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { photoBytes } from '#tests/helpers/test-photo.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();

async function suspended(member: BuiltMember): Promise<Visitor> {
  await Member.update({ suspendedAt: new Date() }, { where: { id: member.id } });
  return app.signIn(member);
}
const act = (who: Visitor, deal: BuiltDeal, name: string, body: object = {}) =>
  who.post(`/api/v1/deals/${deal.code}/${name}`, body, { 'Idempotency-Key': randomUUID() });
const stateOf = async ({ id }: BuiltDeal) => (await Deal.findByPk(id, { rejectOnEmpty: true })).state;
const parcel = (price: string) => ({
  carrier: 'Vale Post',
  trackingNumber: `VP${randomUUID().slice(0, 8)}`,
  insuredValue: price,
});
const note = 'It weighs two grams less than stated.';

describe('a suspended seller', () => {
  it('still ships what is paid into escrow', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const seller = await suspended(deal.seller);
    await act(seller, deal, 'ship', parcel('1900.00')).expect(200);
    expect(await stateOf(deal)).toBe('shipped');
  });

  it('lists nothing and changes no lot', async () => {
    const lot = await buildLot({ state: 'open' });
    const member = await Member.findByPk(lot.sellerId, { rejectOnEmpty: true });
    await member.update({ suspendedAt: new Date() });
    const seller = await app.signIn({ email: member.email, password: 'a-long-enough-password' });
    for (const request of [
      seller.post('/api/v1/lots'),
      seller.post(`/api/v1/lots/${lot.code}/price`, { price: '2000.00' }),
    ]) {
      expect((await request.expect(403)).body.code).toBe('member-suspended');
    }
  });
});

describe('a suspended buyer', () => {
  it('still weighs, photographs and accepts what was delivered', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const buyer = await suspended(deal.buyer);
    const { csrfToken } = await buyer.refreshToken();
    const photo = await buyer.agent
      .post(`/api/v1/deals/${deal.code}/receipt-photo`)
      .set('X-CSRF-Token', csrfToken)
      .attach('file', await photoBytes(), 'scale.jpg')
      .expect(201);
    const mass = { value: '31.20', unit: 'g' };
    await act(buyer, deal, 'receipt', { mass, photoFileId: photo.body.fileId }).expect(200);
    await act(buyer, deal, 'accept').expect(200);
    expect(await stateOf(deal)).toBe('settled');
  });

  it('still contests', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    await act(await suspended(deal.buyer), deal, 'contest', { reason: 'wrong_mass', note }).expect(200);
    expect(await stateOf(deal)).toBe('contested');
  });

  it('still confirms a delivery without signature', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    await deliver(deal, false);
    await act(await suspended(deal.buyer), deal, 'confirm-delivery').expect(200);
    expect(await stateOf(deal)).toBe('delivered');
  });

  it('neither pays an agreed deal nor buys another lot', async () => {
    const deal = await buildDeal();
    const lot = await buildLot({ state: 'open' });
    const buyer = await suspended(deal.buyer);
    const order = { total: '1925.00', delivery: DELIVERY, confirmsAge: true, confirmsRules: true };
    const key = { 'Idempotency-Key': randomUUID() };
    for (const request of [
      act(buyer, deal, 'payment'),
      buyer.post(`/api/v1/lots/${lot.code}/purchase`, order, key),
    ]) {
      expect((await request.expect(403)).body.code).toBe('member-suspended');
    }
    expect(await stateOf(deal)).toBe('agreed');
  });

  it('does nothing to a deal of others', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const other = await suspended(await buildMember());
    await act(other, deal, 'contest', { reason: 'wrong_mass', note }).expect(404);
    expect(await stateOf(deal)).toBe('delivered');
  });
});
