import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { performProviderTasksJob } from '#jobs/perform-provider-tasks.ts';
import { dealLedger } from '#server/features/ledger/ledger-queries.ts';
import { settleDeal } from '#server/features/deals/settle-deal.ts';
import { checkoutOrder } from '#server/features/payments/checkout-order.ts';
import { openCheckout, prepareCheckout } from '#server/features/payments/prepare-checkout.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { logger } from '#server/logger.ts';
import { Deal } from '#server/models/deal.ts';
import { DealEvent } from '#server/models/deal-event.ts';
import { Lot } from '#server/models/lot.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { Payment } from '#server/models/payment.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { buildMember, type BuiltMember } from '#tests/factories/build-member.ts';
import { eventually, signatureOf, startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

/** Of the 120 orders of five messages; each with two of them coming twice. */
const ORDERS = 40;
const PAID_OUT_EVERY = 5;
const DECLINING_CARD = '4000000000000002';

type Message = { id: string; type: string; data: { object: Record<string, unknown> } };

let seller: BuiltMember & { accountId: string };
let buyer: BuiltMember;

beforeAll(async () => {
  seller = await payments.seller();
  buyer = await buildMember();
  await payments.webhooks('drop');
});
afterAll(() => payments.webhooks('normal'));

/** The same numbers in every run (Park and Miller's minimal generator). */
function seeded(seed: number): (below: number) => number {
  let state = seed;
  return (below) => {
    state = (state * 48_271) % 2_147_483_647;
    return state % below;
  };
}

function shuffled<T>(items: readonly T[], next: (below: number) => number): T[] {
  const mixed = [...items];
  for (let at = mixed.length - 1; at > 0; at -= 1) {
    const other = next(at + 1);
    [mixed[at], mixed[other]] = [mixed[other]!, mixed[at]!];
  }
  return mixed;
}

/** All messages in an order drawn anew, two of them a second time somewhere. */
function orderOf(messages: readonly Message[], next: (below: number) => number): Message[] {
  const order = shuffled(messages, next);
  for (let twice = 0; twice < 2; twice += 1) {
    order.splice(next(order.length + 1), 0, messages[next(messages.length)]!);
  }
  return order;
}

async function deliver(messages: readonly Message[]): Promise<void> {
  for (const message of messages) {
    const body = JSON.stringify(message);
    const answer = await fetch(`${app.url}/api/v1/webhooks/stripe`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'stripe-signature': signatureOf(body) },
      body,
    });
    expect(answer.status, message.type).toBe(200);
  }
}

async function messagesSince(known: ReadonlySet<string>): Promise<Message[]> {
  const events = await payments.objects('event');
  return events.map(({ value }) => value as unknown as Message).filter(({ id }) => !known.has(id));
}

const knownNow = async () => new Set((await messagesSince(new Set())).map(({ id }) => id));

/** A deal declined once and then paid, of which no message has come yet. */
async function paidUnheard(): Promise<BuiltDeal> {
  const deal = await buildDeal({ seller, buyer });
  const { attempt } = await inDeal(deal, (unit) => prepareCheckout({ dealId: deal.id }, unit));
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  const { sessionId, url } = await paymentClient().createCheckout(await checkoutOrder(payment));
  const opened = { dealId: deal.id, attempt, sessionId, url: url ?? '' };
  await inDeal(deal, (unit) => openCheckout(opened, unit));
  await payments.pay(sessionId, DECLINING_CARD);
  expect(await payments.pay(sessionId)).toBe('paid');
  return deal;
}

async function release(deal: BuiltDeal): Promise<void> {
  await inDeal(deal, async (unit) => {
    const row = await Deal.findByPk(deal.id, { transaction: unit.tx, rejectOnEmpty: true });
    await row.update({ state: 'accepted' }, { transaction: unit.tx });
    await settleDeal(row, { actorKind: 'buyer', actorId: deal.buyer.id }, unit);
  });
  await performProviderTasksJob.run({ now: new Date(), log: logger });
}

/** Everything that must not depend on the order; a decline that is heard of late is no longer news. */
async function endOf(deal: BuiltDeal) {
  const row = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  const events = await DealEvent.findAll({ where: { dealId: deal.id }, order: [['sequence', 'ASC']] });
  const mails = await OutboxMail.findAll();
  return {
    state: row.state,
    lot: (await Lot.findByPk(deal.lot.id, { rejectOnEmpty: true })).state,
    payment: payment.state,
    ledger: (await dealLedger(deal.id)).map(({ kind }) => kind).sort(),
    acts: events.map(({ act }) => act).filter((act) => act !== 'payment-failed'),
    declines: events.filter(({ act }) => act === 'payment-failed').length <= 1,
    mails: mails
      .filter(({ input }) => (input as { dealCode?: string }).dealCode === deal.code)
      .map(({ mail }) => mail)
      .sort(),
  };
}

/** Two lines a journal, but for the settlement, which divides the sum between seller and house. */
const linesOf = (...kinds: string[]) =>
  kinds.flatMap((kind) => (kind === 'settlement' ? [kind, kind, kind] : [kind, kind])).sort();

describe('the messages about one deal', () => {
  it('end in one state in whatever order and how often they come', async () => {
    const next = seeded(20_261_201);
    const orders = new Set<string>();
    const funded = new Set<string>();
    const paidOut = new Set<string>();
    for (let round = 0; round < ORDERS; round += 1) {
      const known = await knownNow();
      const deal = await paidUnheard();
      const messages = await messagesSince(known);
      const told = messages.find(({ type }) => type === 'checkout.session.completed');
      // The same news under an id of its own, as when the provider tells it to a second address of ours.
      const five = [...messages.slice(-4), { ...told!, id: `${told!.id}_other` }];
      expect(five.map(({ type }) => type)).toContain('checkout.session.completed');
      const order = orderOf(five, next);
      orders.add(order.map(({ id }) => five.findIndex((message) => message.id === id)).join(''));
      await deliver(order);
      funded.add(JSON.stringify(await endOf(deal)));
      if (round % PAID_OUT_EVERY !== 0) continue;

      const before = await knownNow();
      await release(deal);
      const later = await eventually(async () => {
        const found = (await messagesSince(before)).filter(({ type }) => type.startsWith('payout.'));
        expect(found.map(({ type }) => type)).toContain('payout.paid');
        return found;
      });
      // Old news among the new.
      await deliver(orderOf([...later, { ...told!, id: `${told!.id}_late` }], next));
      paidOut.add(JSON.stringify(await endOf(deal)));
    }
    expect(orders.size).toBeGreaterThan(ORDERS / 2);
    expect([...funded].map((end) => JSON.parse(end) as unknown)).toEqual([
      expect.objectContaining({
        state: 'funded',
        lot: 'sold',
        payment: 'paid',
        declines: true,
        ledger: linesOf('funding', 'provider_fee'),
        mails: ['deal-funded-buyer', 'deal-funded-seller'],
      }),
    ]);
    expect([...paidOut].map((end) => JSON.parse(end) as unknown)).toEqual([
      expect.objectContaining({
        state: 'paid_out',
        ledger: linesOf('funding', 'payout', 'provider_fee', 'settlement', 'transfer'),
      }),
    ]);
  }, 180_000);
});
