import { randomUUID } from 'node:crypto';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { recompute } from '#shared/settlement/recompute.ts';
import { lotAnswer, priceFixAnswer } from '#shared/schemas/lots.ts';
import { runJob } from '#jobs/run-job.ts';
import { endPriceFixesJob } from '#jobs/end-price-fixes.ts';
import { newId } from '#server/database/ids.ts';
import { pinDatabaseTime } from '#server/database/transaction.ts';
import { Deal, DealSheet, Lot, Member, PriceFix, Quote, QuotePoll } from '#server/models/index.ts';
import { DELIVERY } from '#tests/factories/build-deal.ts';
import { buildLot, buildRates, type BuiltLot } from '#tests/factories/build-lot.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const MINUTE = 60_000;
const key = () => ({ 'Idempotency-Key': randomUUID() });
const linked = { pricing: 'linked', price: '', linkedPercent: '98.20' };
const build = (wishes: object = {}) =>
  buildLot({ gross: '31.103477', permille: '999.9', draft: linked, ...wishes });
const fix = (visitor: Visitor, { code }: { code: string }, headers = key()) =>
  visitor.post(`/api/v1/lots/${code}/price-fix`, {}, headers);
const buy = (visitor: Visitor, { code }: { code: string }, total: string) =>
  visitor.post(
    `/api/v1/lots/${code}/purchase`,
    { total, delivery: DELIVERY, confirmsAge: true, confirmsRules: true },
    key(),
  );
const stateOf = async ({ id }: { id: string }) => (await Lot.findByPk(id, { rejectOnEmpty: true })).state;

async function setGold(usdPerTroyOunce: string, quotedAt = new Date()): Promise<void> {
  const source = `test-${newId()}`;
  await Quote.create({
    id: newId(),
    metal: 'Au',
    usdPerTroyOunce,
    source,
    quotedAt,
    acceptedAt: new Date(),
  });
}

// 0.999900 oz t × 4182.40 = 4181.98; 98.20 % of it is 4106.70436; with the parcel of 25.00
const [PRICE, TOTAL] = ['4106.70', '4131.70'];
let lot: BuiltLot;
let buyer: BuiltMember;
let visitor: Visitor;

beforeAll(buildRates);
beforeEach(async () => {
  await setGold('4182.40');
  lot = await build();
  buyer = await buildMember();
  visitor = await app.signIn(buyer);
});
afterEach(() => pinDatabaseTime(null));

describe('a price fix', () => {
  it('turns the share of melt into a sum at named quotes and holds the lot for ten minutes', async () => {
    const answer = priceFixAnswer.parse((await fix(visitor, lot).expect(201)).body);
    expect(answer).toMatchObject({
      lotCode: lot.code,
      percent: '98.20',
      price: { amount: PRICE },
      total: { amount: TOTAL },
      quotes: [{ metal: 'Au', usdPerTroyOunce: '4182.4' }],
    });
    const row = await PriceFix.findOne({ where: { openLotId: lot.id }, rejectOnEmpty: true });
    expect(row.fixedUntil.getTime() - row.fixedAt.getTime()).toBe(10 * MINUTE);
    expect(answer.until).toBe(row.fixedUntil.toISOString());
    expect(await stateOf(lot)).toBe('reserved');
  });

  it('stands at its sum for its holder while the quote moves; others see only until when', async () => {
    const { body: made } = await fix(visitor, lot).expect(201);
    await setGold('4200.00');
    const path = `/api/v1/lots/${lot.code}`;
    expect(lotAnswer.parse((await visitor.get(path).expect(200)).body)).toMatchObject({
      priceFix: { isMine: true, until: made.until, price: { amount: PRICE } },
      price: { amount: PRICE },
      sheet: { price: PRICE },
      can: { buy: true, giveUpFix: true, fixPrice: false },
    });
    const other = await app.signIn(await buildMember());
    expect((await other.get(path).expect(200)).body).toMatchObject({
      priceFix: { isMine: false, until: made.until, price: null },
      can: { buy: false, giveUpFix: false, fixPrice: false },
    });
  });

  it('is bought at exactly its price and quotes, and its sheets recompute', async () => {
    await fix(visitor, lot).expect(201);
    await setGold('4200.00');
    expect((await buy(visitor, lot, '4148.99').expect(409)).body.code).toBe('price-changed');
    const { body } = await buy(visitor, lot, TOTAL).expect(201);
    expect(body).toMatchObject({ price: { amount: PRICE }, total: { amount: TOTAL } });
    const deal = await Deal.findOne({ where: { code: body.code }, rejectOnEmpty: true });
    const sheet = await DealSheet.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
    expect(sheet.buyerSheet).toMatchObject({ total: TOTAL, percentOfMelt: '98.20' });
    expect(sheet.buyerSheet.quotes).toMatchObject([{ usdPerTroyOunce: '4182.4' }]);
    expect(recompute(sheet.input, sheet.sellerSheet).differences).toEqual([]);
    expect(await PriceFix.findOne({ where: { lotId: lot.id } })).toMatchObject({
      state: 'used',
      dealId: deal.id,
      openLotId: null,
    });
    expect(await runJob(endPriceFixesJob)).toMatchObject({ failed: 0 });
    expect(await stateOf(lot)).toBe('reserved');
  });

  it('runs out by itself: refused in the purchase though no job has run, then offered again', async () => {
    const { body } = await fix(visitor, lot).expect(201);
    pinDatabaseTime(new Date(Date.parse(body.until) - 1));
    await runJob(endPriceFixesJob);
    expect(await stateOf(lot)).toBe('reserved');
    pinDatabaseTime(new Date(body.until));
    expect((await buy(visitor, lot, TOTAL).expect(409)).body.code).toBe('price-fix-ended');
    expect(await stateOf(lot)).toBe('reserved');
    expect(await runJob(endPriceFixesJob)).toEqual({ ended: 1, failed: 0 });
    expect(await stateOf(lot)).toBe('open');
    expect(await PriceFix.findOne({ where: { lotId: lot.id } })).toMatchObject({ state: 'ran_out' });
    expect((await buy(visitor, lot, TOTAL).expect(409)).body.code).toBe('price-fix-required');
  });

  it('that has run out keeps neither the lot from others nor its member from another lot', async () => {
    const { body } = await fix(visitor, lot).expect(201);
    const [second, other] = [await build(), await app.signIn(await buildMember())];
    const past = new Date(Date.parse(body.until) + 1);
    pinDatabaseTime(past);
    await setGold('4182.40', past);
    await fix(other, lot).expect(201);
    await fix(visitor, second).expect(201);
    expect(await PriceFix.count({ where: { lotId: lot.id, state: 'ran_out' } })).toBe(1);
  });

  it('is given up by a click, by its holder alone', async () => {
    await fix(visitor, lot).expect(201);
    const path = `/api/v1/lots/${lot.code}/price-fix/give-up`;
    const other = await app.signIn(await buildMember());
    expect((await other.post(path).expect(409)).body.code).toBe('price-fix-ended');
    const { body } = await visitor.post(path).expect(200);
    expect(body).toMatchObject({ state: 'open', priceFix: null, can: { fixPrice: true, giveUpFix: false } });
    expect((await visitor.post(path).expect(409)).body.code).toBe('price-fix-ended');
    expect(body.history.map(({ act }: { act: string }) => act).slice(-2)).toEqual([
      'price-fixed',
      'fix-given-up',
    ]);
  });

  it('answers the same under its key, and makes one fix of two at once', async () => {
    const headers = key();
    const first = await fix(visitor, lot, headers).expect(201);
    expect((await fix(visitor, lot, headers).expect(201)).body).toEqual(first.body);
    const [fresh, other] = [await build(), await app.signIn(await buildMember())];
    const third = await app.signIn(await buildMember());
    const both = await Promise.all([fix(other, fresh), fix(third, fresh)]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(both.find(({ status }) => status === 409)?.body.code).toBe('lot-taken');
    expect(await PriceFix.count({ where: { lotId: fresh.id } })).toBe(1);
  });

  it('is one a member, also when two lots are fixed at once', async () => {
    const both = await Promise.all([fix(visitor, lot), fix(visitor, await build())]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(both.find(({ status }) => status === 409)?.body.code).toBe('price-fix-held');
  });
});

describe('a price fix is refused', () => {
  it('without a session and without a key', async () => {
    await fix(await app.visitor(), lot).expect(401);
    const bare = await visitor.post(`/api/v1/lots/${lot.code}/price-fix`).expect(400);
    expect(bare.body.code).toBe('idempotency-key-required');
  });

  it('of the same lot within a day, and granted after it', async () => {
    const { body } = await fix(visitor, lot).expect(201);
    await visitor.post(`/api/v1/lots/${lot.code}/price-fix/give-up`).expect(200);
    expect((await fix(visitor, lot).expect(409)).body.code).toBe('price-fix-too-soon');
    const fixedAt = Date.parse(body.until) - 10 * MINUTE;
    const dayLater = new Date(fixedAt + 24 * 60 * MINUTE);
    await setGold('4182.40', dayLater);
    pinDatabaseTime(new Date(dayLater.getTime() - 1));
    expect((await fix(visitor, lot).expect(409)).body.code).toBe('price-fix-too-soon');
    pinDatabaseTime(dayLater);
    await fix(visitor, lot).expect(201);
    await Quote.destroy({ where: { quotedAt: dayLater } });
  });

  it('of the own lot, of an outright one, of one not open, and by the suspended', async () => {
    const seller = await buildMember({ canSell: true });
    const own = await build({ sellerId: seller.id });
    expect((await fix(await app.signIn(seller), own).expect(409)).body.code).toBe('own-lot');
    const outright = await buildLot();
    expect((await fix(visitor, outright).expect(409)).body.code).toBe('price-not-linked');
    const paused = await build({ state: 'paused' });
    expect((await fix(visitor, paused).expect(409)).body.code).toBe('lot-not-open');
    await fix(visitor, await build({ state: 'draft' })).expect(404);
    await Member.update({ suspendedAt: new Date() }, { where: { id: buyer.id } });
    expect((await fix(visitor, lot).expect(403)).body.code).toBe('member-suspended');
  });

  it('while its quote is stale or the market is closed', async () => {
    await Quote.update({ quotedAt: new Date(Date.now() - 301_000) }, { where: { metal: 'Au' } });
    expect((await fix(visitor, lot).expect(409)).body.code).toBe('no-fresh-quote');
    await setGold('4182.40');
    const closed = { outcome: 'accepted', marketOpen: false, marketUntil: null, detail: {} } as const;
    await QuotePoll.create({ id: newId(), polledAt: new Date(), ...closed });
    expect((await fix(visitor, lot).expect(409)).body.code).toBe('market-closed');
    await QuotePoll.destroy({ where: {} });
    expect(await stateOf(lot)).toBe('open');
  });

  it('where its sum is outside the limits of the house', async () => {
    const small = await build({ gross: '0.100', permille: '999.9' });
    expect((await fix(visitor, small).expect(409)).body.code).toBe('price-out-of-bounds');
    expect(await stateOf(small)).toBe('open');
  });
});
