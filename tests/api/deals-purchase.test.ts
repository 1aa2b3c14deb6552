import { randomUUID } from 'node:crypto';
import { Op } from 'sequelize';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { recompute } from '#shared/settlement/recompute.ts';
import { dealAnswer } from '#shared/schemas/deals.ts';
import { pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { newId } from '#server/database/ids.ts';
import { heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { purchaseLot } from '#server/features/deals/purchase-lot.ts';
import { Deal, DealSheet, Lot, Member, Quote, QuotePoll } from '#server/models/index.ts';
import { DELIVERY } from '#tests/factories/build-deal.ts';
import { buildLot, repriceLot } from '#tests/factories/build-lot.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const TOTAL = '1925.00';
const body = (changes: object = {}) => ({
  total: TOTAL,
  delivery: DELIVERY,
  confirmsAge: true,
  confirmsRules: true,
  ...changes,
});
const key = () => ({ 'Idempotency-Key': randomUUID() });
const buy = (visitor: Visitor, code: string, changes: object = {}, headers = key()) =>
  visitor.post(`/api/v1/lots/${code}/purchase`, body(changes), headers);

let buyer: BuiltMember;
let visitor: Visitor;
beforeAll(async () => {
  buyer = await buildMember({ timeZone: 'America/Denver' });
  visitor = await app.signIn(buyer);
});
afterEach(() => pinDatabaseTime(null));

describe('a purchase', () => {
  it('makes one deal, reserves the lot, and answers what was computed', async () => {
    const lot = await buildLot();
    const answer = await buy(visitor, lot.code).expect(201);
    const deal = dealAnswer.parse(answer.body);
    expect(deal).toMatchObject({
      state: 'agreed',
      side: 'buyer',
      price: { amount: '1900.00' },
      shipping: { amount: '25.00' },
      total: { amount: TOTAL },
      held: { amount: '0.00' },
      commission: null,
      certificateUrl: null,
      delivery: { name: 'Ada Quill' },
      due: { who: 'buyer', act: 'Pay into escrow' },
      can: { pay: true, ship: false, accept: false },
    });
    expect(Date.parse(deal.due!.at!) - Date.parse(deal.agreedAt)).toBe(35 * 60_000);
    expect((await Lot.findByPk(lot.id))?.state).toBe('reserved');
    expect(deal.events).toMatchObject([{ act: 'agreed', who: 'buyer', held: { amount: '0.00' } }]);
  });

  it('keeps provisional sheets that recompute to the cent from what is stored', async () => {
    const lot = await buildLot();
    const { body: answer } = await buy(visitor, lot.code).expect(201);
    const deal = await Deal.findOne({ where: { code: answer.code }, rejectOnEmpty: true });
    const sheet = await DealSheet.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
    expect(sheet.moment).toBe('provisional');
    const input = sheet.input;
    expect(recompute(input, sheet.sellerSheet).differences).toEqual([]);
    expect(recompute({ ...input, audience: 'buyer' }, sheet.buyerSheet).differences).toEqual([]);
    expect(sheet.buyerSheet.total).toBe(TOTAL);
    // 4 % of 1900.00, by the dated fee schedule
    expect(deal.commissionMinor).toBe(7600n);
    expect(sheet.sellerSheet.total).toBe('1849.00');
    expect(answer.provisionalSheet.quotes).toHaveLength(1);
    expect(answer.quotes[0]).toMatchObject({ metal: 'Au', source: 'test' });
    expect(JSON.stringify(answer)).not.toContain('"commission":{');
    expect(await heldMinor(deal.id)).toBe(0n);
  });

  it('is there for the two sides and the desk, and for nobody else', async () => {
    const lot = await buildLot();
    const { body: answer } = await buy(visitor, lot.code).expect(201);
    const sellerMember = await Member.findByPk(lot.sellerId, { rejectOnEmpty: true });
    const seller = await app.signIn({ email: sellerMember.email, password: buyer.password });
    const desk = await app.signIn(await buildMember({ role: 'desk' }));
    const stranger = await app.signIn(await buildMember());
    const path = `/api/v1/deals/${answer.code}`;
    const forSeller = await seller.get(path).expect(200);
    expect(forSeller.body).toMatchObject({
      side: 'seller',
      delivery: null,
      commission: {
        percent: '4',
        minimum: { amount: '2.00' },
        amount: { amount: '76.00' },
        net: { amount: '1849.00' },
      },
      can: { pay: false },
    });
    expect((await desk.get(path).expect(200)).body).toMatchObject({
      side: 'desk',
      delivery: { name: 'Ada Quill' },
    });
    await stranger.get(path).expect(404);
    await (await app.visitor()).get(path).expect(401);
  });
});

describe('a purchase is refused', () => {
  it('without a session, without a key, and without the page’s token', async () => {
    const lot = await buildLot();
    await buy(await app.visitor(), lot.code).expect(401);
    const bare = await visitor.post(`/api/v1/lots/${lot.code}/purchase`, body()).expect(400);
    expect(bare.body.code).toBe('idempotency-key-required');
    const forged = await visitor.agent
      .post(`/api/v1/lots/${lot.code}/purchase`)
      .set(key())
      .send(body())
      .expect(403);
    expect(forged.body.code).toBe('csrf-token-invalid');
    expect((await Lot.findByPk(lot.id))?.state).toBe('open');
  });

  it('for fields that are missing, all at once', async () => {
    const lot = await buildLot();
    const delivery = { ...DELIVERY, name: '', phone: 'x', country: 'usa' };
    const answer = await buy(visitor, lot.code, { delivery, confirmsAge: false, total: '1,925.00' }).expect(
      422,
    );
    expect(answer.body.errors.map((fault: { pointer: string }) => fault.pointer).sort()).toEqual([
      '/confirmsAge',
      '/delivery/country',
      '/delivery/name',
      '/delivery/phone',
      '/total',
    ]);
  });

  it('of the own lot', async () => {
    const seller = await buildMember({ canSell: true });
    const lot = await buildLot({ sellerId: seller.id });
    expect((await buy(await app.signIn(seller), lot.code).expect(409)).body.code).toBe('own-lot');
  });

  it.each(['closed', 'withdrawn', 'paused'] as const)('of a lot that is %s', async (state) => {
    const lot = await buildLot({ state });
    expect((await buy(visitor, lot.code).expect(409)).body.code).toBe('lot-not-open');
  });

  it.each(['draft', 'submitted', 'returned'] as const)(
    'of a %s lot, which is not there for others',
    async (state) => {
      const lot = await buildLot({ state });
      expect((await buy(visitor, lot.code).expect(404)).body.code).toBe('not-found');
    },
  );

  it('of a lot that does not exist', async () => {
    await buy(visitor, 'S-ZZZZZZ').expect(404);
  });

  it('after the closing day, before the job has closed the lot', async () => {
    const lot = await buildLot();
    const { closesAt } = await Lot.findByPk(lot.id, { rejectOnEmpty: true });
    pinDatabaseTime(closesAt);
    const quotes = { state: 'none', marketUntil: null, byMetal: {} } as const;
    const attempt = withTransaction({ lots: [lot.id] }, (unit) =>
      purchaseLot({ lotId: lot.id, total: TOTAL, delivery: DELIVERY }, { ...unit, quotes }, buyer.actor),
    );
    await expect(attempt).rejects.toMatchObject({ code: 'lot-not-open' });
  });

  it('of a lot that another buyer holds', async () => {
    const lot = await buildLot();
    await buy(await app.signIn(await buildMember()), lot.code).expect(201);
    expect((await buy(visitor, lot.code).expect(409)).body.code).toBe('lot-taken');
  });

  it('when the price has changed since it was seen', async () => {
    const lot = await buildLot();
    await repriceLot(lot, '1950.00');
    expect((await buy(visitor, lot.code).expect(409)).body.code).toBe('price-changed');
    await buy(visitor, lot.code, { total: '1975.00' }).expect(201);
  });

  it('to a country that the seller does not ship to', async () => {
    const lot = await buildLot();
    const answer = await buy(visitor, lot.code, { delivery: { ...DELIVERY, country: 'NZ' } }).expect(422);
    expect(answer.body).toMatchObject({
      code: 'destination-not-served',
      errors: [{ pointer: '/delivery/country' }],
    });
  });

  it('by a suspended member, and from a suspended seller', async () => {
    const suspended = await buildMember();
    const session = await app.signIn(suspended);
    await Member.update(
      { suspendedAt: new Date(), suspensionReason: 'Test' },
      { where: { id: suspended.id } },
    );
    const lot = await buildLot();
    expect((await buy(session, lot.code).expect(403)).body.code).toBe('member-suspended');
    await Member.update(
      { suspendedAt: new Date(), suspensionReason: 'Test' },
      { where: { id: lot.sellerId } },
    );
    expect((await buy(visitor, lot.code).expect(409)).body.code).toBe('lot-not-open');
  });

  it('where no quote of the metal was ever accepted', async () => {
    const lot = await buildLot();
    const quotes = { state: 'none', marketUntil: null, byMetal: {} } as const;
    const attempt = withTransaction({ lots: [lot.id] }, (unit) =>
      purchaseLot({ lotId: lot.id, total: TOTAL, delivery: DELIVERY }, { ...unit, quotes }, buyer.actor),
    );
    await expect(attempt).rejects.toMatchObject({ code: 'no-fresh-quote' });
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(0);
  });

  it('changes nothing, whatever the reason', async () => {
    const lot = await buildLot();
    await buy(visitor, lot.code, { total: '1.00' }).expect(409);
    await buy(visitor, lot.code, { delivery: { ...DELIVERY, country: 'NZ' } }).expect(422);
    expect((await Lot.findByPk(lot.id))?.state).toBe('open');
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(0);
  });
});

describe('a stale quote', () => {
  it('does not hinder an outright price; the sheet names the quote and its time', async () => {
    const lot = await buildLot();
    const quote = await Quote.findOne({
      where: { metal: 'Au' },
      order: [['acceptedAt', 'DESC']],
      rejectOnEmpty: true,
    });
    pinDatabaseTime(new Date(Date.now() + 3 * 3600_000));
    const answer = await buy(visitor, lot.code).expect(201);
    expect(answer.body.quotes[0].at).toBe(quote.quotedAt.toISOString());
    const [note, ...others] = answer.body.provisionalSheet.assumed as { field: string; reason: string }[];
    expect([note?.field, others]).toEqual(['/quotes/Au', []]);
    expect(note?.reason).toMatch(/^No fresh quote at agreement: the quote of .+ UTC was [23] hours old\.$/);
    const deal = await Deal.findOne({ where: { code: answer.body.code }, rejectOnEmpty: true });
    const sheet = await DealSheet.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
    expect(recompute(sheet.input, sheet.sellerSheet).isEqual).toBe(true);
  });
});

describe('a quote of a closed market', () => {
  it('is named as such on the sheet', async () => {
    const lot = await buildLot();
    const poll = await QuotePoll.create({
      id: newId(),
      polledAt: new Date(),
      outcome: 'accepted',
      marketOpen: false,
      detail: {},
    });
    const answer = await buy(visitor, lot.code).expect(201);
    await poll.destroy();
    expect(answer.body.provisionalSheet.assumed).toMatchObject([
      { field: '/quotes/Au', reason: expect.stringMatching(/^The market was closed at agreement: /) },
    ]);
  });
});

describe('the same key', () => {
  it('gets the same answer again and makes no second deal', async () => {
    const lot = await buildLot();
    const headers = key();
    const first = await buy(visitor, lot.code, {}, headers).expect(201);
    const again = await buy(visitor, lot.code, {}, headers).expect(201);
    expect(again.body).toEqual(first.body);
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(1);
  });

  it('with another body is refused', async () => {
    const lot = await buildLot();
    const headers = key();
    await buy(visitor, lot.code, {}, headers).expect(201);
    const other = await buy(visitor, lot.code, { total: '1.00' }, headers).expect(422);
    expect(other.body.code).toBe('idempotency-key-reused');
  });

  it('that met a refusal of state stays refused, though the state has changed', async () => {
    const lot = await buildLot();
    const headers = key();
    const changes = { total: '1975.00' };
    await buy(visitor, lot.code, changes, headers).expect(409);
    await repriceLot(lot, '1950.00');
    expect((await buy(visitor, lot.code, changes, headers).expect(409)).body.code).toBe('price-changed');
    await buy(visitor, lot.code, changes).expect(201);
  });
});

describe('many at once', () => {
  it('twenty buyers make exactly one deal; the others are told who was first', async () => {
    const lot = await buildLot();
    const buyers = await Promise.all(Array.from({ length: 20 }, () => buildMember()));
    const visitors: Visitor[] = [];
    for (const member of buyers) visitors.push(await app.signIn(member));
    const answers = await Promise.all(visitors.map((each) => buy(each, lot.code)));
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses).toEqual([201, ...Array.from({ length: 19 }, () => 409)]);
    for (const { status, body: answer } of answers) if (status === 409) expect(answer.code).toBe('lot-taken');
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(1);
    expect(await Deal.count({ where: { liveLotId: lot.id, state: { [Op.eq]: 'agreed' } } })).toBe(1);
  });

  it('one buyer’s double click under one key makes one deal and one answer', async () => {
    const lot = await buildLot();
    const headers = key();
    const answers = await Promise.all(Array.from({ length: 5 }, () => buy(visitor, lot.code, {}, headers)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(new Set(answers.map(({ body: answer }) => answer.code)).size).toBe(1);
    expect(await Deal.count({ where: { lotId: lot.id } })).toBe(1);
  });
});
