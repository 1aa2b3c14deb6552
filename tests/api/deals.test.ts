import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { recompute } from '#shared/settlement/recompute.ts';
import { dealAnswer, dealsAnswer } from '#shared/schemas/deals.ts';
import { cancelUnshippedDeals } from '#jobs/cancel-unshipped-deals.ts';
import { databaseNow, pinDatabaseTime } from '#server/database/transaction.ts';
import { dealLedger, heldMinor } from '#server/features/ledger/ledger-queries.ts';
import {
  AuditEntry,
  Deal,
  DealEvent,
  DealSheet,
  LedgerJournal,
  Lot,
  OutboxMail,
  Payout,
  ProviderTask,
  Refund,
} from '#server/models/index.ts';
import { buildDeal, deliver, DELIVERY, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const key = () => ({ 'Idempotency-Key': randomUUID() });
const pathOf = ({ code }: BuiltDeal, act = '') => `/api/v1/deals/${code}${act === '' ? '' : `/${act}`}`;
const stateOf = async ({ id }: BuiltDeal) => (await Deal.findByPk(id, { rejectOnEmpty: true })).state;
const mailsOf = async ({ id }: BuiltDeal) =>
  (await OutboxMail.findAll({ order: [['uniqueKey', 'ASC']] }))
    .filter(({ uniqueKey }) => uniqueKey.includes(id))
    .map(({ mail }) => mail)
    .sort();
const signIn = (member: BuiltMember) => app.signIn(member);
const HOUR = 3_600_000;

/** Moves the database's clock of this process; it goes on standing there. */
async function later(hours: number): Promise<void> {
  pinDatabaseTime(new Date((await databaseNow()).getTime() + hours * HOUR));
}
afterEach(() => pinDatabaseTime(null));

const parcel = (changes: object = {}) => ({
  carrier: 'Vale Post',
  trackingNumber: `VP ${randomUUID().slice(0, 8)}`,
  insuredValue: '1900.00',
  ...changes,
});

async function expectRefused(
  visitor: Visitor,
  path: string,
  body: object,
  [status, code]: [number, string],
): Promise<void> {
  const answer = await visitor.post(path, body, key());
  expect([answer.status, answer.body.code]).toEqual([status, code]);
}

describe('shipping', () => {
  it('takes carrier, number and insured value, and orders that the parcel is followed', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const seller = await signIn(deal.seller);
    const before = dealAnswer.parse((await seller.get(pathOf(deal)).expect(200)).body);
    expect(before).toMatchObject({
      held: { amount: '1925.00' },
      delivery: DELIVERY,
      due: { who: 'seller' },
      can: { ship: true },
    });
    const { body } = await seller
      .post(pathOf(deal, 'ship'), parcel({ trackingNumber: 'VP 1234 567' }))
      .expect(200);
    expect(dealAnswer.parse(body)).toMatchObject({
      state: 'shipped',
      parcel: { carrier: 'Vale Post', trackingNumber: 'VP 1234 567', insured: { amount: '1900.00' } },
      due: { who: 'carrier' },
      can: { ship: false },
    });
    const task = await ProviderTask.findOne({ where: { dealId: deal.id, kind: 'register_parcel' } });
    expect(task?.state).toBe('due');
    expect(await mailsOf(deal)).toContain('parcel-shipped');
  });

  it('is refused below the price, at its field', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const seller = await signIn(deal.seller);
    const low = await seller.post(pathOf(deal, 'ship'), parcel({ insuredValue: '1899.99' })).expect(422);
    expect(low.body.errors).toMatchObject([{ pointer: '/insuredValue', code: 'insured-too-low' }]);
    const bad = await seller.post(pathOf(deal, 'ship'), parcel({ insuredValue: '1900.001' })).expect(422);
    expect(bad.body.errors).toMatchObject([{ pointer: '/insuredValue', code: 'too-many-decimals' }]);
    expect(await stateOf(deal)).toBe('funded');
  });

  it('is refused with a tracking number that another deal has', async () => {
    const [one, two] = [await buildDeal({ state: 'funded' }), await buildDeal({ state: 'funded' })];
    const same = parcel();
    await (await signIn(one.seller)).post(pathOf(one, 'ship'), same).expect(200);
    const answer = await (await signIn(two.seller)).post(pathOf(two, 'ship'), same).expect(422);
    expect(answer.body.errors).toMatchObject([{ pointer: '/trackingNumber', code: 'tracking-number-used' }]);
    expect(await stateOf(two)).toBe('funded');
  });

  it('is the seller’s, once, in time, of a paid deal that is not frozen', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const ship = pathOf(deal, 'ship');
    const seller = await signIn(deal.seller);
    await expectRefused(await signIn(deal.buyer), ship, parcel(), [403, 'forbidden']);
    await expectRefused(await signIn(await buildMember()), ship, parcel(), [404, 'not-found']);
    await expectRefused(await signIn(await buildMember({ role: 'desk' })), ship, parcel(), [
      403,
      'forbidden',
    ]);
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    await expectRefused(seller, ship, parcel(), [409, 'deal-frozen']);
    await Deal.update({ frozenAt: null }, { where: { id: deal.id } });
    const { shipBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    pinDatabaseTime(shipBy);
    await expectRefused(seller, ship, parcel(), [409, 'deadline-passed']);
    pinDatabaseTime(new Date(shipBy!.getTime() - 1));
    await seller.post(ship, parcel()).expect(200);
    await expectRefused(seller, ship, parcel(), [409, 'illegal-transition']);
    const unpaid = await buildDeal();
    await expectRefused(await signIn(unpaid.seller), pathOf(unpaid, 'ship'), parcel(), [
      409,
      'illegal-transition',
    ]);
  });
});

describe('receiving', () => {
  it('records the mass as typed and compares it with the lot’s', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const buyer = await signIn(deal.buyer);
    const mass = { value: '31.170', unit: 'g' };
    const { body } = await buyer.post(pathOf(deal, 'receipt'), { mass }).expect(200);
    expect(body).toMatchObject({
      receipt: { mass, differenceGrams: '-0.03', isWithinScales: false },
      can: { recordReceipt: false, accept: true, contest: true },
      due: { who: 'buyer', act: 'Accept or contest' },
    });
    await expectRefused(buyer, pathOf(deal, 'receipt'), { mass }, [409, 'illegal-transition']);
  });

  it.each([
    ['0', 'g', '/mass/value'],
    ['-1', 'g', '/mass/value'],
    ['12,5', 'g', '/mass/value'],
    ['1000000000', 'g', '/mass/value'],
    ['1.123456789012345', 'g', '/mass/value'],
    ['31.2', '', '/mass/unit'],
    ['31.2', 'stone', '/mass/unit'],
  ])('refuses %s %s at its field', async (value, unit, pointer) => {
    const deal = await buildDeal({ state: 'delivered' });
    const buyer = await signIn(deal.buyer);
    const answer = await buyer.post(pathOf(deal, 'receipt'), { mass: { value, unit } }).expect(422);
    expect(answer.body.errors[0].pointer).toBe(pointer);
  });

  it('is the buyer’s, after the delivery, with a photo of his own', async () => {
    const mass = { value: '31.20', unit: 'g' };
    const deal = await buildDeal({ state: 'delivered' });
    await expectRefused(await signIn(deal.seller), pathOf(deal, 'receipt'), { mass }, [403, 'forbidden']);
    const buyer = await signIn(deal.buyer);
    const foreign = { mass, photoFileId: randomUUID() };
    await expectRefused(buyer, pathOf(deal, 'receipt'), foreign, [422, 'invalid-input']);
    const early = await buildDeal({ state: 'shipped' });
    const waiting = await signIn(early.buyer);
    await expectRefused(waiting, pathOf(early, 'receipt'), { mass }, [409, 'illegal-transition']);
  });
});

describe('accepting', () => {
  it('settles in the same step: final sheet, journal, commission, order to release', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const buyer = await signIn(deal.buyer);
    const { body } = await buyer.post(pathOf(deal, 'accept'), {}, key()).expect(200);
    const answer = dealAnswer.parse(body);
    expect(answer).toMatchObject({ state: 'settled', held: { amount: '0.00' }, payout: { state: 'due' } });
    expect(answer.events.map(({ act }) => act)).toEqual([
      'agreed',
      'funded',
      'shipped',
      'delivered',
      'receipt-recorded',
      'accepted',
      'settled',
    ]);
    expect(answer.events.map(({ held }) => held.amount)).toEqual([
      '0.00',
      '1925.00',
      '1925.00',
      '1925.00',
      '1925.00',
      '1925.00',
      '0.00',
    ]);
    const final = await DealSheet.findOne({
      where: { dealId: deal.id, moment: 'final' },
      rejectOnEmpty: true,
    });
    expect(recompute(final.input, final.sellerSheet).differences).toEqual([]);
    expect(final.sellerSheet.moment).toBe('final');
    const settlement = (await dealLedger(deal.id)).filter(({ kind }) => kind === 'settlement');
    expect(settlement.map(({ account, amountMinor }) => [account, amountMinor])).toEqual([
      ['escrow', 192_500n],
      ['commission', -7_600n],
      ['member_payable', -184_900n],
    ]);
    expect((await Payout.findOne({ where: { dealId: deal.id } }))?.amountMinor).toBe(184_900n);
    expect(await mailsOf(deal)).toEqual(
      expect.arrayContaining(['deal-accepted-buyer', 'deal-accepted-seller']),
    );
  });

  it('twice under one key is one acceptance with one answer', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const buyer = await signIn(deal.buyer);
    const headers = key();
    const first = await buyer.post(pathOf(deal, 'accept'), {}, headers).expect(200);
    const again = await buyer.post(pathOf(deal, 'accept'), {}, headers).expect(200);
    expect(again.body).toEqual(first.body);
    const other = await buyer.post(pathOf(await buildDeal({ buyer: deal.buyer }), 'accept'), {}, headers);
    expect([other.status, other.body.code]).toEqual([422, 'idempotency-key-reused']);
  });

  it('many at once settle once', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const buyer = await signIn(deal.buyer);
    const answers = await Promise.all(
      Array.from({ length: 8 }, () => buyer.post(pathOf(deal, 'accept'), {}, key())),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([
      200,
      ...Array.from({ length: 7 }, () => 409),
    ]);
    expect(await LedgerJournal.count({ where: { dealId: deal.id, kind: 'settlement' } })).toBe(1);
    expect(await Payout.count({ where: { dealId: deal.id } })).toBe(1);
    expect(await DealEvent.count({ where: { dealId: deal.id, act: 'settled' } })).toBe(1);
  });

  it('against a contest at once: one of the two, never both', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    const buyer = await signIn(deal.buyer);
    const objection = { reason: 'wrong_mass', note: 'Two grams are missing.' };
    const [accept, contest] = await Promise.all([
      buyer.post(pathOf(deal, 'accept'), {}, key()),
      buyer.post(pathOf(deal, 'contest'), objection),
    ]);
    expect([accept.status, contest.status].sort()).toEqual([200, 409]);
    expect(await stateOf(deal)).toBe(accept.status === 200 ? 'settled' : 'contested');
    expect(await heldMinor(deal.id)).toBe(accept.status === 200 ? 0n : 192_500n);
  });

  it('is the buyer’s, after the delivery and the weighing, of a deal that is not frozen', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const accept = pathOf(deal, 'accept');
    const buyer = await signIn(deal.buyer);
    await expectRefused(await signIn(deal.seller), accept, {}, [403, 'forbidden']);
    await expectRefused(await signIn(await buildMember()), accept, {}, [404, 'not-found']);
    await expectRefused(buyer, accept, {}, [409, 'illegal-transition']);
    await buyer.post(pathOf(deal, 'receipt'), { mass: { value: '31.20', unit: 'g' } }).expect(200);
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    await expectRefused(buyer, accept, {}, [409, 'deal-frozen']);
    await Deal.update({ frozenAt: null }, { where: { id: deal.id } });
    expect((await buyer.post(accept)).body.code).toBe('idempotency-key-required');
    await buyer.post(accept, {}, key()).expect(200);
    const early = await buildDeal({ state: 'shipped' });
    await expectRefused(await signIn(early.buyer), pathOf(early, 'accept'), {}, [409, 'illegal-transition']);
  });

  it('is not done by silence', async () => {
    const deal = await buildDeal({ state: 'delivered', hasReceipt: true });
    await later(24 * 30);
    await cancelUnshippedDeals({ now: await databaseNow() });
    expect(await stateOf(deal)).toBe('delivered');
    const buyer = await signIn(deal.buyer);
    await buyer.post(pathOf(deal, 'accept'), {}, key()).expect(200);
  });
});

describe('contesting', () => {
  const note = 'It is two grams lighter than stated.';

  it('after the delivery keeps the money held and tells both sides', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const buyer = await signIn(deal.buyer);
    const { body } = await buyer.post(pathOf(deal, 'contest'), { reason: 'wrong_mass', note }).expect(200);
    expect(dealAnswer.parse(body)).toMatchObject({
      state: 'contested',
      held: { amount: '1925.00' },
      contest: { reason: 'wrong_mass', note },
      due: { who: 'desk' },
      can: { accept: false, contest: false },
    });
    expect((await mailsOf(deal)).filter((mail) => mail === 'deal-contested')).toHaveLength(2);
  });

  it('“not arrived” opens ten days after shipping, to the millisecond', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    const { shippedAt, arriveBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(arriveBy!.getTime() - shippedAt!.getTime()).toBe(240 * HOUR);
    const buyer = await signIn(deal.buyer);
    const objection = { reason: 'not_arrived', note: 'Nothing has come so far.' };
    pinDatabaseTime(new Date(arriveBy!.getTime() - 1));
    expect((await buyer.get(pathOf(deal))).body.can.contest).toBe(false);
    await expectRefused(buyer, pathOf(deal, 'contest'), objection, [409, 'illegal-transition']);
    pinDatabaseTime(arriveBy);
    expect((await buyer.get(pathOf(deal))).body.can.contest).toBe(true);
    await buyer.post(pathOf(deal, 'contest'), objection).expect(200);
  });

  it('is refused with a reason that does not fit, without a note, by others, when frozen or too late', async () => {
    const deal = await buildDeal({ state: 'delivered' });
    const contest = pathOf(deal, 'contest');
    const buyer = await signIn(deal.buyer);
    await expectRefused(buyer, contest, { reason: 'not_arrived', note }, [422, 'invalid-input']);
    await expectRefused(buyer, contest, { reason: 'wrong_mass', note: 'no' }, [422, 'invalid-input']);
    await expectRefused(buyer, contest, { reason: 'ugly', note }, [422, 'invalid-input']);
    await expectRefused(await signIn(deal.seller), contest, { reason: 'wrong_mass', note }, [
      403,
      'forbidden',
    ]);
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    await expectRefused(buyer, contest, { reason: 'wrong_mass', note }, [409, 'deal-frozen']);
    const settled = await buildDeal({ state: 'settled' });
    const late = await signIn(settled.buyer);
    await expectRefused(late, pathOf(settled, 'contest'), { reason: 'damaged', note }, [
      409,
      'illegal-transition',
    ]);
    const onTheWay = await buildDeal({ state: 'shipped' });
    const waiting = await signIn(onTheWay.buyer);
    await expectRefused(waiting, pathOf(onTheWay, 'contest'), { reason: 'damaged', note }, [
      422,
      'invalid-input',
    ]);
  });
});

describe('a deal that is not shipped in time', () => {
  it('is cancelled at its deadline, not before; the lot closes and the refund is ordered', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const { shipBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    pinDatabaseTime(new Date(shipBy!.getTime() - 1));
    await cancelUnshippedDeals({ now: await databaseNow() });
    // A runner whose own clock is ahead finds the deal, and the command still refuses to be early.
    await cancelUnshippedDeals({ now: new Date(shipBy!.getTime() + HOUR) });
    expect(await stateOf(deal)).toBe('funded');
    pinDatabaseTime(shipBy);
    expect(await cancelUnshippedDeals({ now: await databaseNow() })).toEqual({ cancelled: 1 });
    expect(await cancelUnshippedDeals({ now: await databaseNow() })).toEqual({ cancelled: 0 });
    const after = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(after).toMatchObject({
      state: 'cancelled',
      liveLotId: null,
      endReason: 'The seller did not ship in time.',
    });
    expect((await Lot.findByPk(deal.lot.id))?.state).toBe('closed');
    expect(await Refund.findOne({ where: { dealId: deal.id } })).toMatchObject({
      state: 'due',
      amountMinor: 192_500n,
    });
    expect((await mailsOf(deal)).filter((mail) => mail === 'deal-cancelled')).toHaveLength(2);
  });

  it('while frozen is left alone, and the deadline moves by the length of the freeze', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const { shipBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    const desk = await signIn(await buildMember({ role: 'desk' }));
    const freeze = `/api/v1/desk/deals/${deal.code}/freeze`;
    await desk.post(freeze, { reason: 'An official request came in.' }).expect(200);
    await later(24 * 20);
    const pinned = await databaseNow();
    expect(await cancelUnshippedDeals({ now: pinned })).toEqual({ cancelled: 0 });
    const again = await signIn(await buildMember({ role: 'desk' }));
    const { body } = await again.post(`/api/v1/desk/deals/${deal.code}/unfreeze`).expect(200);
    expect(body.isFrozen).toBe(false);
    const after = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    const movedBy = after.shipBy!.getTime() - shipBy!.getTime();
    expect(Math.abs(movedBy - 24 * 20 * HOUR)).toBeLessThan(HOUR);
  });
});

describe('where I stand', () => {
  it('sorts my deals into to do, running and closed, as either side', async () => {
    const me = await buildMember({ canSell: true });
    const toPay = await buildDeal({ buyer: me });
    const toShip = await buildDeal({ seller: me, state: 'funded' });
    const waiting = await buildDeal({ buyer: me, state: 'funded' });
    const settled = await buildDeal({ seller: me, state: 'settled' });
    const visitor = await signIn(me);
    const answer = dealsAnswer.parse((await visitor.get('/api/v1/deals').expect(200)).body);
    const codes = (rows: { code: string }[]) => rows.map(({ code }) => code).sort();
    expect(codes(answer.toDo)).toEqual([toPay.code, toShip.code].sort());
    expect(codes(answer.running)).toEqual([waiting.code, settled.code].sort());
    expect(answer.closed).toEqual([]);
    expect(answer.toDo.find(({ code }) => code === toShip.code)).toMatchObject({
      side: 'seller',
      isMyTurn: true,
    });
    await (await app.visitor()).get('/api/v1/deals').expect(401);
  });

  it('keeps to my own deals', async () => {
    await buildDeal({ state: 'funded' });
    const answer = await (await signIn(await buildMember())).get('/api/v1/deals').expect(200);
    expect(answer.body).toMatchObject({ toDo: [], running: [], closed: [] });
  });
});

describe('the sheet as PDF', () => {
  it('is each side’s own, and nobody else’s', async () => {
    const deal = await buildDeal({ state: 'settled' });
    const path = pathOf(deal, 'sheet.pdf');
    const answer = await (await signIn(deal.seller)).get(path).buffer(true).expect(200);
    expect(answer.headers['content-type']).toBe('application/pdf');
    expect(answer.headers['content-disposition']).toBe(`inline; filename="scruple-${deal.code}-final.pdf"`);
    expect(
      Buffer.from(answer.body as Buffer)
        .subarray(0, 5)
        .toString(),
    ).toBe('%PDF-');
    await (await signIn(deal.buyer)).get(path).expect(200);
    await (await signIn(await buildMember())).get(path).expect(404);
  });
});

describe('the desk’s acts', () => {
  it('leave their line in the audit trail', async () => {
    const deal = await buildDeal({ state: 'funded' });
    const staff = await buildMember({ role: 'desk' });
    const desk = await signIn(staff);
    const reason = 'An official request came in.';
    await desk.post(`/api/v1/desk/deals/${deal.code}/freeze`, { reason }).expect(200);
    await desk.post(`/api/v1/desk/deals/${deal.code}/unfreeze`).expect(200);
    const entries = await AuditEntry.findAll({ where: { subjectId: deal.code }, order: [['at', 'ASC']] });
    expect(entries.map(({ act, actorId }) => [act, actorId])).toEqual([
      ['freeze-deal', staff.id],
      ['unfreeze-deal', staff.id],
    ]);
  });

  it('a delivery during a freeze is taken over, and its inspection is moved by what of the freeze it saw', async () => {
    const deal = await buildDeal({ state: 'shipped' });
    const staff = await buildMember({ role: 'desk' });
    await (
      await signIn(staff)
    )
      .post(`/api/v1/desk/deals/${deal.code}/freeze`, { reason: 'Look at this.' })
      .expect(200);
    await later(24);
    await deliver(deal);
    const { inspectBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    await later(48);
    await (await signIn(staff)).post(`/api/v1/desk/deals/${deal.code}/unfreeze`).expect(200);
    const after = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(after.state).toBe('delivered');
    expect(after.inspectBy!.getTime() - inspectBy!.getTime()).toBe(48 * HOUR);
  });
});
