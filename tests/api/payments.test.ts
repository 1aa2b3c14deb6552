import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { PAYMENT_MINOR_MAX } from '#shared/limits.ts';
import { pinDatabaseTime } from '#server/database/transaction.ts';
import { accountSumMinor, heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';
import { Lot } from '#server/models/lot.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { Payment } from '#server/models/payment.ts';
import { buildDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildMember } from '#tests/factories/build-member.ts';
import { dealLedgerTable } from '#tests/helpers/ledger-table.ts';
import { eventually, startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp, type Visitor } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

const TOO_LATE_MINUTES = 36;

afterEach(async () => {
  pinDatabaseTime(null);
  await payments.noFaults();
  await payments.webhooks('normal');
});

const path = (deal: BuiltDeal) => `/api/v1/deals/${deal.code}/payment`;
const start = (visitor: Visitor, deal: BuiltDeal, key: string = randomUUID()) =>
  visitor.post(path(deal), {}, { 'Idempotency-Key': key });

async function dealWithBuyer() {
  const deal = await buildDeal();
  return { deal, buyer: await app.signIn(deal.buyer) };
}

async function sessionOf(deal: BuiltDeal): Promise<string> {
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  return payment.providerSessionId ?? '';
}

async function sessionsAtProvider(deal: BuiltDeal) {
  const sessions = await payments.objects('checkout.session');
  return sessions.filter(({ value }) => value['client_reference_id'] === deal.id);
}

async function stateOf(deal: BuiltDeal) {
  return (await Deal.findByPk(deal.id, { rejectOnEmpty: true })).state;
}

const becomes = (deal: BuiltDeal, state: Deal['state']) =>
  eventually(async () => expect(await stateOf(deal)).toBe(state));

describe('starting a payment', () => {
  it("answers the provider's page and until when it can be paid", async () => {
    const { deal, buyer } = await dealWithBuyer();
    const answer = await start(buyer, deal).expect(200);
    const [session] = await sessionsAtProvider(deal);
    expect(answer.body.url).toBe(session!.value['url']);
    const { totalMinor, fundBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(session!.value['amount_total']).toBe(Number.parseInt(totalMinor.toString(), 10));
    expect(new Date(answer.body.expiresAt).getTime()).toBeGreaterThanOrEqual(fundBy.getTime());
  });

  it('gives the provider its half hour also shortly before the deadline', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const { agreedAt } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    const late = new Date(agreedAt.getTime() + 34 * 60_000);
    pinDatabaseTime(late);
    const answer = await start(buyer, deal).expect(200);
    expect(new Date(answer.body.expiresAt).getTime()).toBeGreaterThanOrEqual(late.getTime() + 30 * 60_000);
  });

  it('answers the same under the same key and under another, and has one session', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const key = randomUUID();
    const first = await start(buyer, deal, key).expect(200);
    const again = await start(buyer, deal, key).expect(200);
    const other = await start(buyer, deal).expect(200);
    expect(again.text).toBe(first.text);
    expect(other.body.url).toBe(first.body.url);
    expect(await sessionsAtProvider(deal)).toHaveLength(1);
  });

  it('opens one session for twenty clicks at once', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const answers = await Promise.all(Array.from({ length: 20 }, () => start(buyer, deal)));
    expect(answers.map(({ status }) => status)).toEqual(Array.from({ length: 20 }, () => 200));
    expect(new Set(answers.map(({ body }) => body.url)).size).toBe(1);
    expect(await sessionsAtProvider(deal)).toHaveLength(1);
    const after = await start(buyer, deal).expect(200);
    expect(after.body.url).toBe(answers[0]!.body.url);
  });

  it('needs a key, and refuses one that was used for another deal', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const missing = await buyer.post(path(deal)).expect(400);
    expect(missing.body.code).toBe('idempotency-key-required');
    const other = await buildDeal({ buyer: deal.buyer });
    const key = randomUUID();
    await start(buyer, deal, key).expect(200);
    const reused = await start(buyer, other, key).expect(422);
    expect(reused.body.code).toBe('idempotency-key-reused');
  });

  it('is for the buyer alone', async () => {
    const { deal } = await dealWithBuyer();
    const key = { 'Idempotency-Key': randomUUID() };
    const seller = await app.signIn(deal.seller);
    await start(seller, deal).expect(403);
    const desk = await app.signIn(await buildMember({ role: 'desk' }));
    await start(desk, deal).expect(403);
    const stranger = await app.signIn(await buildMember());
    await start(stranger, deal).expect(404);
    const visitor = await app.visitor();
    await visitor.post(path(deal), {}, key).expect(401);
  });

  it('is refused after the deadline and once funded, and such a key stays refused', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const { agreedAt } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    pinDatabaseTime(new Date(agreedAt.getTime() + TOO_LATE_MINUTES * 60_000));
    const key = randomUUID();
    expect((await start(buyer, deal, key).expect(409)).body.code).toBe('deadline-passed');
    pinDatabaseTime(null);
    expect((await start(buyer, deal, key).expect(409)).body.code).toBe('deadline-passed');
    await start(buyer, deal).expect(200);
    await payments.pay(await sessionOf(deal));
    await becomes(deal, 'funded');
    expect((await start(buyer, deal).expect(409)).body.code).toBe('illegal-transition');
  });

  it('is refused while the desk has frozen the deal', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    expect((await start(buyer, deal).expect(409)).body.code).toBe('deal-frozen');
  });
});

describe('when the provider fails', () => {
  const create = '/v1/checkout/sessions';

  it.each(['500', '409', 'reset', 'html'] as const)(
    'gets over one answer of kind %s by itself',
    async (kind) => {
      const { deal, buyer } = await dealWithBuyer();
      await payments.fault({ kind, path: create, method: 'POST', count: 1 });
      await start(buyer, deal).expect(200);
      expect(await sessionsAtProvider(deal)).toHaveLength(1);
    },
  );

  it('asks to come again on 429, and the same key then works', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const key = randomUUID();
    await payments.fault({ kind: '429', path: create, method: 'POST', count: 1 });
    const refused = await start(buyer, deal, key).expect(503);
    expect(refused.body.code).toBe('payment-provider-unavailable');
    expect(refused.headers['retry-after']).toBeDefined();
    await start(buyer, deal, key).expect(200);
  });

  it('finds the session again whose answer was lost', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await payments.fault({ kind: 'reset', path: create, method: 'POST', count: 1, stage: 'after' });
    const answer = await start(buyer, deal).expect(200);
    const sessions = await sessionsAtProvider(deal);
    expect(sessions).toHaveLength(1);
    expect(answer.body.url).toBe(sessions[0]!.value['url']);
  });

  it('goes on under the next key when the provider keeps a failure under the first', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await payments.fault({ kind: '500', path: create, method: 'POST', count: 1, stage: 'saved' });
    const answer = await start(buyer, deal).expect(200);
    const sessions = await sessionsAtProvider(deal);
    expect(sessions.map(({ value }) => value['url'])).toEqual([answer.body.url]);
    expect(await Payment.findOne({ where: { dealId: deal.id } })).toMatchObject({
      attempt: 2,
      state: 'open',
    });
    expect(await payments.pay(await sessionOf(deal))).toBe('paid');
    await becomes(deal, 'funded');
  });

  it('has one page for ten clicks at once when a failure is kept', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await payments.fault({ kind: '500', path: create, method: 'POST', count: 1, stage: 'saved' });
    const answers = await Promise.all(Array.from({ length: 10 }, () => start(buyer, deal)));
    const urls = answers.filter(({ status }) => status === 200).map(({ body }) => body.url);
    expect(urls.length).toBeGreaterThan(0);
    expect(new Set(urls).size).toBe(1);
    expect((await start(buyer, deal).expect(200)).body.url).toBe(urls[0]);
    expect(await sessionsAtProvider(deal)).toHaveLength(1);
  });

  it('says of a definite refusal that it is one, and charges nothing', async () => {
    const { deal, buyer } = await dealWithBuyer();
    // One cent more than a card payment carries; a lot at such a price is refused before it is listed.
    const tooMuch = { priceMinor: PAYMENT_MINOR_MAX, shippingMinor: 1n, totalMinor: PAYMENT_MINOR_MAX + 1n };
    await Deal.update(tooMuch, { where: { id: deal.id } });
    const refused = await start(buyer, deal).expect(409);
    expect(refused.body).toMatchObject({ code: 'payment-refused-by-provider' });
    expect(refused.body.detail).toMatch(/Nothing was charged/);
    expect(await sessionsAtProvider(deal)).toEqual([]);
    expect(await stateOf(deal)).toBe('agreed');
  });

  it('holds nothing and changes no state while it is down', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await payments.fault({ kind: '500', path: create, method: 'POST', count: 3 });
    await start(buyer, deal).expect(503);
    expect(await stateOf(deal)).toBe('agreed');
    expect(await heldMinor(deal.id)).toBe(0n);
  });
});

describe('a paid session', () => {
  it('funds the deal, sells the lot, books sum and fee, and orders both mails', async () => {
    const { deal, buyer } = await dealWithBuyer();
    const before = await accountSumMinor({ kind: 'provider' });
    const atProvider = await payments.balance('platform');
    await start(buyer, deal).expect(200);
    expect(await payments.pay(await sessionOf(deal))).toBe('paid');
    await becomes(deal, 'funded');
    const row = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(row.totalMinor);
    expect(row.shipBy).not.toBeNull();
    expect((await Lot.findByPk(deal.lot.id, { rejectOnEmpty: true })).state).toBe('sold');
    expect((await accountSumMinor({ kind: 'provider' })) - before).toBe(row.totalMinor - payment.feeMinor!);
    expect((await payments.balance('platform')) - atProvider).toBe(row.totalMinor - payment.feeMinor!);
    const mails = await OutboxMail.findAll({ where: { memberId: [deal.buyer.id, deal.seller.id] } });
    expect(mails.map(({ mail }) => mail)).toEqual(
      expect.arrayContaining(['deal-funded-buyer', 'deal-funded-seller']),
    );
    const table = await dealLedgerTable(deal.id);
    expect(
      table
        .split('\n')
        .map((line) => line.slice(0, 12).trim())
        .filter(Boolean),
    ).toEqual(['what', 'funding', 'provider fee']);
  });

  it('funds the deal by the return page when no message comes', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await payments.webhooks('drop');
    await start(buyer, deal).expect(200);
    const open = await buyer.post(`${path(deal)}/refresh`).expect(200);
    expect(open.body).toEqual({ state: 'agreed', payment: 'open' });
    await payments.pay(await sessionOf(deal));
    expect(await stateOf(deal)).toBe('agreed');
    const paid = await buyer.post(`${path(deal)}/refresh`).expect(200);
    expect(paid.body).toEqual({ state: 'funded', payment: 'paid' });
    await buyer.post(`${path(deal)}/refresh`).expect(200);
    const { totalMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
  });

  it('is booked once when the message and ten returns come at the same time', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await start(buyer, deal).expect(200);
    await payments.webhooks('duplicate');
    await payments.pay(await sessionOf(deal));
    await Promise.all(Array.from({ length: 10 }, () => buyer.post(`${path(deal)}/refresh`).expect(200)));
    await becomes(deal, 'funded');
    const { totalMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    expect(await DealEvent.count({ where: { dealId: deal.id, act: 'funded' } })).toBe(1);
  });

  it('may follow a declined card: the decline is told once, the deal funded once', async () => {
    const { deal, buyer } = await dealWithBuyer();
    await start(buyer, deal).expect(200);
    const sessionId = await sessionOf(deal);
    expect(await payments.pay(sessionId, '4000000000009995')).toBe('declined');
    const declines = { where: { dealId: deal.id, act: 'payment-failed' } };
    await eventually(async () => expect(await DealEvent.count(declines)).toBe(1));
    expect(await stateOf(deal)).toBe('agreed');
    expect(await heldMinor(deal.id)).toBe(0n);
    expect(await payments.pay(sessionId)).toBe('paid');
    await becomes(deal, 'funded');
    expect(await DealEvent.count(declines)).toBe(1);
  });

  it("shows the return page's answer to the buyer alone", async () => {
    const { deal } = await dealWithBuyer();
    await (await app.signIn(deal.seller)).post(`${path(deal)}/refresh`).expect(403);
    await (await app.signIn(await buildMember())).post(`${path(deal)}/refresh`).expect(404);
    await (await app.visitor()).post(`${path(deal)}/refresh`).expect(401);
  });
});
