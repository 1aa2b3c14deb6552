import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { performProviderTasksJob } from '#jobs/perform-provider-tasks.ts';
import { reconcilePaymentsJob } from '#jobs/reconcile-payments.ts';
import { runChecksJob } from '#jobs/run-checks.ts';
import { pinDatabaseTime } from '#server/database/transaction.ts';
import { accountSumMinor, dealLedger, heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { settleDeal } from '#server/features/deals/settle-deal.ts';
import { applyCheckout, closePayment } from '#server/features/payments/apply-checkout.ts';
import { checkoutOrder } from '#server/features/payments/checkout-order.ts';
import { fundDeal } from '#server/features/payments/fund-deal.ts';
import { lapseDeal } from '#server/features/payments/lapse-deal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { logger } from '#server/logger.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';
import { LedgerJournal } from '#server/models/ledger-journal.ts';
import { Lot } from '#server/models/lot.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { Payment } from '#server/models/payment.ts';
import { PayoutAccount } from '#server/models/payout-account.ts';
import { Payout } from '#server/models/payout.ts';
import { ProviderEvent } from '#server/models/provider-event.ts';
import { Refund } from '#server/models/refund.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { eventually, signatureOf, startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

afterEach(async () => {
  pinDatabaseTime(null);
  await payments.noFaults();
  await payments.webhooks('normal');
});

function send(body: string, signature: string | null) {
  return fetch(`${app.url}/api/v1/webhooks/stripe`, {
    method: 'POST',
    headers: {
      'content-type': 'application/json',
      ...(signature === null ? {} : { 'stripe-signature': signature }),
    },
    body,
  });
}

const outcomeOf = async (answer: Response) => ((await answer.json()) as { outcome: string }).outcome;

/** A deal whose buyer has opened the provider's page; its messages are held until they are let go. */
async function opened(deal?: BuiltDeal) {
  const built = deal ?? (await buildDeal());
  const buyer = await app.signIn(built.buyer);
  await buyer
    .post(`/api/v1/deals/${built.code}/payment`, {}, { 'Idempotency-Key': randomUUID() })
    .expect(200);
  const payment = await Payment.findOne({ where: { dealId: built.id }, rejectOnEmpty: true });
  return { deal: built, sessionId: payment.providerSessionId ?? '' };
}

async function dealRow(deal: BuiltDeal) {
  return Deal.findByPk(deal.id, { rejectOnEmpty: true });
}

const becomes = (deal: BuiltDeal, state: Deal['state']) =>
  eventually(async () => expect((await dealRow(deal)).state).toBe(state));

async function eventAbout(objectId: string, type: string) {
  const events = await payments.objects('event');
  const found = events.find(({ value }) => {
    const about = (value['data'] as { object: { id: string } }).object;
    return value['type'] === type && about.id === objectId;
  });
  return found!.value;
}

/** Paid at the provider, with no message delivered: the event as the provider would send it. */
async function paidSilently() {
  const { deal, sessionId } = await opened();
  await payments.webhooks('drop');
  await payments.pay(sessionId);
  const event = await eventAbout(sessionId, 'checkout.session.completed');
  return { deal, sessionId, event, body: JSON.stringify(event, null, 2) };
}

describe('the signature', () => {
  const body = JSON.stringify({
    id: 'evt_x',
    object: 'event',
    type: 'x.y',
    created: 1,
    data: { object: {} },
  });
  const now = Math.floor(Date.now() / 1000);

  it.each([
    ['is missing', null],
    ['is made with another secret', signatureOf(body, { secret: 'whsec_other' })],
    ['is for another body', signatureOf(`${body} `)],
    ['is older than five minutes', signatureOf(body, { at: now - 301 - 5 })],
    ['is dated ahead', signatureOf(body, { at: now + 600 })],
    ['is no signature', 'nonsense'],
  ])('is refused when it %s', async (_, signature) => {
    const answer = await send(body, signature);
    expect(answer.status).toBe(400);
    expect(answer.headers.get('content-type')).toContain('application/problem+json');
    expect(((await answer.json()) as { code: string }).code).toBe('signature-invalid');
    expect(await ProviderEvent.findByPk('evt_x')).toBeNull();
  });

  it('cannot be got round by a form or a changed sum', async () => {
    const { deal, body: paid } = await paidSilently();
    const forged = paid.replace(/"amount_total": \d+/, '"amount_total": 1');
    expect(forged).not.toBe(paid);
    expect((await send(forged, signatureOf(paid))).status).toBe(400);
    expect((await dealRow(deal)).state).toBe('agreed');
  });

  it('is enough: no session and no token are asked for', async () => {
    const known = { id: `evt_${randomUUID()}`, object: 'event', type: 'plan.created', created: 1 };
    const unknown = JSON.stringify({ ...known, data: { object: { id: 'plan_1' } } });
    const answer = await send(unknown, signatureOf(unknown));
    expect(answer.status).toBe(200);
    expect(await outcomeOf(answer)).toBe('ignored');
    expect((await ProviderEvent.findByPk(known.id, { rejectOnEmpty: true })).outcome).toBe('ignored');
  });
});

describe('a message that cannot be dealt with', () => {
  const eventOf = (id: string, objectId: string) =>
    JSON.stringify({
      id,
      object: 'event',
      type: 'checkout.session.completed',
      created: 1,
      data: { object: { id: objectId } },
    });

  it.each([
    ['a very long id', `evt_${'x'.repeat(200)}`, 'cs_test_1'],
    ['an empty id', '', 'cs_test_1'],
    ['an id with blanks', 'evt 1', 'cs_test_1'],
    ['an object with a very long id', 'evt_long_object', `cs_${'x'.repeat(200)}`],
  ])('is refused for %s and not kept', async (_name, id, objectId) => {
    const before = await ProviderEvent.count();
    const body = eventOf(id, objectId);
    const answer = await send(body, signatureOf(body));
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ code: 'malformed-request' });
    expect(await ProviderEvent.count()).toBe(before);
  });

  it('is kept as ignored when the provider itself does not know its object', async () => {
    const id = `evt_${randomUUID()}`;
    const body = eventOf(id, 'cs_test_nobody_knows');
    const answer = await send(body, signatureOf(body));
    expect([answer.status, await outcomeOf(answer)]).toEqual([200, 'ignored']);
    expect((await ProviderEvent.findByPk(id, { rejectOnEmpty: true })).outcome).toBe('ignored');
    expect(await outcomeOf(await send(body, signatureOf(body)))).toBe('duplicate');
  });
});

describe('one message', () => {
  it('has one effect when it comes ten times in parallel', async () => {
    const { deal, body, event } = await paidSilently();
    const answers = await Promise.all(Array.from({ length: 10 }, () => send(body, signatureOf(body))));
    expect(answers.map(({ status }) => status)).toEqual(Array.from({ length: 10 }, () => 200));
    const outcomes = await Promise.all(answers.map(outcomeOf));
    expect(outcomes.filter((outcome) => outcome === 'applied')).toHaveLength(1);
    expect(outcomes.filter((outcome) => outcome === 'duplicate')).toHaveLength(9);
    const { totalMinor, state } = await dealRow(deal);
    expect(state).toBe('funded');
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    const row = await ProviderEvent.findByPk(String(event['id']), { rejectOnEmpty: true });
    expect(row).toMatchObject({ outcome: 'applied', deliveries: 10 });
  });

  it('has no second effect under another event id', async () => {
    const { deal, event } = await paidSilently();
    const copies = Array.from({ length: 5 }, (_, index) =>
      JSON.stringify({ ...event, id: `${String(event['id'])}_${index}` }),
    );
    const answers = await Promise.all(copies.map((copy) => send(copy, signatureOf(copy))));
    const outcomes = await Promise.all(answers.map(outcomeOf));
    expect(outcomes.sort()).toEqual(['applied', 'no_effect', 'no_effect', 'no_effect', 'no_effect']);
    expect(await DealEvent.count({ where: { dealId: deal.id, act: 'funded' } })).toBe(1);
  });

  it('comes again while the provider cannot be asked, and then has its effect', async () => {
    const { deal, body } = await paidSilently();
    await payments.fault({ kind: '500', path: '/v1/checkout/sessions/*', method: 'GET', count: 3 });
    expect((await send(body, signatureOf(body))).status).toBe(503);
    expect((await dealRow(deal)).state).toBe('agreed');
    expect(await outcomeOf(await send(body, signatureOf(body)))).toBe('applied');
    expect((await dealRow(deal)).state).toBe('funded');
  });

  it('that says a session has expired closes the payment and leaves the deal', async () => {
    const { deal, sessionId } = await opened();
    await payments.control('clock', { advanceSeconds: 3 * 3600 });
    await eventually(async () => {
      const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
      expect(payment.state).toBe('expired');
    });
    expect((await dealRow(deal)).state).toBe('agreed');
    const again = await opened(deal);
    expect(again.sessionId).not.toBe(sessionId);
  });
});

describe('money that cannot be taken', () => {
  it('is refunded in full by the same command when it comes after the lapse', async () => {
    const { deal, sessionId } = await opened();
    const { fundBy, totalMinor } = await dealRow(deal);
    pinDatabaseTime(new Date(fundBy.getTime() + 1_000));
    await inDeal(deal, async (unit) => {
      await closePayment({ dealId: deal.id, sessionId }, unit);
      await lapseDeal({ dealId: deal.id }, unit);
    });
    const atProvider = await payments.balance('platform');
    const ours = await accountSumMinor({ kind: 'provider' });
    await payments.pay(sessionId);
    await eventually(async () => expect(await Refund.count({ where: { dealId: deal.id } })).toBe(1));
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    await performProviderTasksJob.run({ now: new Date(), log: logger });
    expect(await heldMinor(deal.id)).toBe(0n);
    expect((await dealRow(deal)).state).toBe('lapsed');
    expect((await Lot.findByPk(deal.lot.id, { rejectOnEmpty: true })).state).toBe('open');
    const refund = await Refund.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
    expect(refund).toMatchObject({ state: 'succeeded', amountMinor: totalMinor });
    expect((await accountSumMinor({ kind: 'provider' })) - ours).toBe(
      (await payments.balance('platform')) - atProvider,
    );
    const mails = await OutboxMail.findAll({ where: { memberId: deal.buyer.id } });
    expect(mails.map(({ mail }) => mail)).toContain('late-payment-refunded');
  });

  it('is refunded in full when a deal is paid a second time; the deal goes on and is funded once', async () => {
    const { deal, sessionId } = await opened();
    const order = await checkoutOrder(
      await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true }),
    );
    const stray = await paymentClient().createCheckout({ ...order, idempotencyKey: `stray:${randomUUID()}` });
    await payments.pay(sessionId);
    await becomes(deal, 'funded');
    const { totalMinor, code } = await dealRow(deal);
    const gap = async () =>
      (await accountSumMinor({ kind: 'provider' })) - (await payments.balance('platform'));
    const gapBefore = await gap();
    await payments.webhooks('duplicate');
    expect(await payments.pay(stray.sessionId)).toBe('paid');
    await eventually(async () =>
      expect(await AuditEntry.count({ where: { act: 'return-second-payment', subjectId: code } })).toBe(1),
    );
    const reading = await paymentClient().readCheckout(stray.sessionId);
    const again = await inDeal(deal, (unit) => applyCheckout({ dealId: deal.id, reading }, unit));
    expect(again).toBe('already');
    expect(await accountSumMinor({ kind: 'member_payable', memberId: deal.buyer.id })).toBe(-totalMinor);
    await performProviderTasksJob.run({ now: new Date(), log: logger });
    await performProviderTasksJob.run({ now: new Date(), log: logger });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    expect(await accountSumMinor({ kind: 'member_payable', memberId: deal.buyer.id })).toBe(0n);
    expect((await dealRow(deal)).state).toBe('funded');
    const refunds = (await payments.objects('refund')).filter(
      ({ value }) => value['payment_intent'] === reading.paymentIntentId,
    );
    expect(refunds.map(({ value }) => BigInt(value['amount'] as number))).toEqual([totalMinor]);
    expect(await gap()).toBe(gapBefore);
    const mails = await OutboxMail.findAll({ where: { memberId: deal.buyer.id } });
    expect(mails.filter(({ mail }) => mail === 'second-payment-refunded')).toHaveLength(1);
  });

  it.each([
    ['another sum', { amountMinor: 100n }],
    ['another currency', { currency: 'EUR' }],
  ])('of %s is not booked, and an admin is told', async (_, change) => {
    const { deal, sessionId } = await opened();
    const { totalMinor, code } = await dealRow(deal);
    const mark = randomUUID();
    const checkout = {
      sessionId,
      amountMinor: totalMinor,
      currency: 'USD',
      paymentIntentId: `pi_${mark}`,
      chargeId: `ch_${mark}`,
      balanceTransactionId: `txn_${mark}`,
      feeMinor: 30n,
      ...change,
    };
    expect(await inDeal(deal, (unit) => fundDeal({ dealId: deal.id, checkout }, unit))).toBe('mismatch');
    expect((await dealRow(deal)).state).toBe('agreed');
    expect(await dealLedger(deal.id)).toEqual([]);
    expect(await AuditEntry.count({ where: { act: 'refuse-payment', subjectId: code } })).toBe(1);
  });
});

/** A deal paid, delivered and accepted, with the stand-in's own charge and account behind it. */
async function releasedDeal(bank?: string) {
  const seller = await payments.seller(bank);
  const { deal, sessionId } = await opened(await buildDeal({ seller }));
  await payments.pay(sessionId);
  await becomes(deal, 'funded');
  await Deal.update({ state: 'delivered' }, { where: { id: deal.id } });
  return { deal, seller };
}

async function release(deal: BuiltDeal) {
  await inDeal(deal, async (unit) => {
    const row = await Deal.findByPk(deal.id, { transaction: unit.tx, rejectOnEmpty: true });
    await row.update({ state: 'accepted' }, { transaction: unit.tx });
    await settleDeal(row, { actorKind: 'buyer', actorId: deal.buyer.id }, unit);
  });
  await performProviderTasksJob.run({ now: new Date(), log: logger });
}

async function payoutOf(deal: BuiltDeal) {
  return Payout.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
}

describe('payout messages', () => {
  it('pay the deal out, with mails to both, and the books agree to the cent', async () => {
    const { deal, seller } = await releasedDeal();
    await release(deal);
    await becomes(deal, 'paid_out');
    const payout = await payoutOf(deal);
    expect(payout.state).toBe('paid');
    expect(await payments.balance(seller.accountId)).toBe(0n);
    expect(await accountSumMinor({ kind: 'member_connected', memberId: seller.id })).toBe(0n);
    expect(await accountSumMinor({ kind: 'member_payable', memberId: seller.id })).toBe(0n);
    const mails = await OutboxMail.findAll({ where: { memberId: [deal.buyer.id, seller.id] } });
    expect(mails.map(({ mail }) => mail)).toEqual(
      expect.arrayContaining(['payout-sent-buyer', 'payout-sent-seller']),
    );
  });

  it('take a payout back that fails after it was paid, and it is sent anew after a day', async () => {
    const { deal, seller } = await releasedDeal();
    await release(deal);
    await becomes(deal, 'paid_out');
    const first = await payoutOf(deal);
    await payments.control(`payouts/${first.providerPayoutId}/fail`, { code: 'no_account' });
    await becomes(deal, 'settled');
    expect((await payoutOf(deal)).state).toBe('failed');
    const owed = await accountSumMinor({ kind: 'member_connected', memberId: seller.id });
    expect(owed).toBe(first.amountMinor);
    expect(await payments.balance(seller.accountId)).toBe(owed);
    const nextDay = new Date(Date.now() + 25 * 3_600_000);
    pinDatabaseTime(nextDay);
    await reconcilePaymentsJob.run({ now: nextDay, log: logger });
    await performProviderTasksJob.run({ now: nextDay, log: logger });
    await becomes(deal, 'paid_out');
    const second = await payoutOf(deal);
    expect(second.providerPayoutId).not.toBe(first.providerPayoutId);
    expect(await payments.balance(seller.accountId)).toBe(0n);
    expect((await dealLedger(deal.id)).filter(({ kind }) => kind === 'payout_returned')).toHaveLength(2);
  });

  it('show a payout that the bank refused, once, and send it anew when the seller has named another', async () => {
    const { deal, seller } = await releasedDeal('000111111116');
    await release(deal);
    await eventually(async () => expect((await payoutOf(deal)).state).toBe('failed'));
    expect((await payoutOf(deal)).failureCode).toBe('no_account');
    expect((await dealRow(deal)).state).toBe('settled');
    const { providerPayoutId } = await payoutOf(deal);
    const event = await eventAbout(providerPayoutId!, 'payout.failed');
    const copy = JSON.stringify({ ...event, id: `evt_${randomUUID()}` });
    expect(await outcomeOf(await send(copy, signatureOf(copy)))).toBe('no_effect');
    expect((await payoutOf(deal)).state).toBe('failed');
    await eventually(async () => {
      const account = await PayoutAccount.findOne({ where: { memberId: seller.id }, rejectOnEmpty: true });
      expect(account.payoutsEnabled).toBe(false);
    });
    await payments.control('onboard', { accountId: seller.accountId });
    await eventually(async () => {
      await performProviderTasksJob.run({ now: new Date(), log: logger });
      expect((await dealRow(deal)).state).toBe('paid_out');
    });
    expect((await payoutOf(deal)).attempt).toBe(2);
    expect(await payments.balance(seller.accountId)).toBe(0n);
  });

  it('may all come shuffled and twice: the end is the same', async () => {
    await payments.webhooks('shuffle', 400);
    const { deal } = await releasedDeal();
    await release(deal);
    await becomes(deal, 'paid_out');
    for (const { value } of await payments.objects('event')) {
      const copy = JSON.stringify({ ...value, id: `${String(value['id'])}_again` });
      expect((await send(copy, signatureOf(copy))).status).toBe(200);
    }
    expect((await dealRow(deal)).state).toBe('paid_out');
    const kinds = (await dealLedger(deal.id)).map(({ kind }) => kind);
    expect(new Set(kinds)).toEqual(new Set(['funding', 'provider_fee', 'settlement', 'transfer', 'payout']));
  });
});

describe('the books at the end', () => {
  it('break no invariant, and equal the provider', async () => {
    await payments.flush();
    await eventually(async () => {
      const { breaches } = await runChecksJob.run({ now: new Date(), log: logger });
      expect(Object.keys(breaches as object)).toEqual([]);
    });
    expect(await accountSumMinor({ kind: 'provider' })).toBe(await payments.balance('platform'));
  });

  it('name each charge, refund, transfer and payout of the provider once, and nothing else', async () => {
    const moved = await Promise.all(
      (['charge', 'refund', 'transfer', 'payout'] as const).map((kind) => payments.objects(kind)),
    );
    const [charges, refunds, transfers, payouts] = moved;
    const atProvider = [
      ...charges!.filter(({ owner, value }) => owner === 'platform' && value['status'] === 'succeeded'),
      ...refunds!,
      ...transfers!,
      ...payouts!.filter(({ value }) => value['status'] === 'paid'),
    ].map(({ id }) => id);
    const journals = await LedgerJournal.findAll({
      where: { kind: ['funding', 'refund', 'transfer', 'payout'] },
    });
    const returned = await LedgerJournal.findAll({ where: { kind: 'payout_returned' } });
    const takenBack = new Set(returned.map(({ reversesJournalId }) => reversesJournalId));
    const booked = journals
      .filter(({ id }) => !takenBack.has(id))
      .map(({ providerObjectId }) => providerObjectId);
    expect(atProvider.length).toBeGreaterThan(8);
    expect(booked.sort()).toEqual(atProvider.sort());
  });
});
