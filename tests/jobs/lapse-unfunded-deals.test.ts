import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { lapseUnfundedDealsJob } from '#jobs/lapse-unfunded-deals.ts';
import { performProviderTasksJob } from '#jobs/perform-provider-tasks.ts';
import { pinDatabaseTime } from '#server/database/transaction.ts';
import { heldMinor } from '#server/features/ledger/ledger-queries.ts';
import { lapseDeal } from '#server/features/payments/lapse-deal.ts';
import { prepareCheckout } from '#server/features/payments/prepare-checkout.ts';
import { logger } from '#server/logger.ts';
import { Deal } from '#server/models/deal.ts';
import { Lot } from '#server/models/lot.ts';
import { OutboxMail } from '#server/models/outbox-mail.ts';
import { Payment } from '#server/models/payment.ts';
import { ProviderTask } from '#server/models/provider-task.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

afterEach(async () => {
  pinDatabaseTime(null);
  await payments.noFaults();
  await payments.webhooks('normal');
});

const stateOf = async ({ id }: BuiltDeal) => (await Deal.findByPk(id, { rejectOnEmpty: true })).state;
const lotStateOf = async ({ lot }: BuiltDeal) => (await Lot.findByPk(lot.id, { rejectOnEmpty: true })).state;
const paymentOf = ({ id }: BuiltDeal) => Payment.findOne({ where: { dealId: id }, rejectOnEmpty: true });

async function openPage(deal: BuiltDeal): Promise<string> {
  const buyer = await app.signIn(deal.buyer);
  await buyer.post(`/api/v1/deals/${deal.code}/payment`, {}, { 'Idempotency-Key': randomUUID() }).expect(200);
  return (await paymentOf(deal)).providerSessionId ?? '';
}

async function statusAtProvider(sessionId: string) {
  const sessions = await payments.objects('checkout.session');
  return sessions.find(({ id }) => id === sessionId)?.value['status'];
}

/** The job at a moment before or after the deal's deadline. */
async function lapseAt(deal: BuiltDeal, seconds: number) {
  const { fundBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
  const now = new Date(fundBy.getTime() + seconds * 1000);
  pinDatabaseTime(now);
  return lapseUnfundedDealsJob.run({ now, log: logger });
}

describe('the lapse of unfunded deals', () => {
  it('puts the lot back to open and tells both, when nobody started to pay', async () => {
    const deal = await buildDeal();
    await lapseAt(deal, -1);
    expect(await stateOf(deal)).toBe('agreed');
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('lapsed');
    expect(await lotStateOf(deal)).toBe('open');
    expect((await Deal.findByPk(deal.id, { rejectOnEmpty: true })).liveLotId).toBeNull();
    const mails = await OutboxMail.findAll({
      where: { mail: 'deal-lapsed', memberId: [deal.buyer.id, deal.seller.id] },
    });
    expect(mails).toHaveLength(2);
  });

  it('expires an open session at the provider first', async () => {
    const deal = await buildDeal();
    const sessionId = await openPage(deal);
    await lapseAt(deal, 1);
    expect(await statusAtProvider(sessionId)).toBe('expired');
    expect(await stateOf(deal)).toBe('lapsed');
    expect((await paymentOf(deal)).state).toBe('expired');
    expect(await payments.pay(sessionId)).toBe('closed');
  });

  it('funds the deal instead when the session turns out to be paid', async () => {
    const deal = await buildDeal();
    await payments.webhooks('drop');
    await payments.pay(await openPage(deal));
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('funded');
    expect(await lotStateOf(deal)).toBe('sold');
    const { totalMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
  });

  it('lapses nothing while the provider does not answer, and does so later', async () => {
    const deal = await buildDeal();
    const sessionId = await openPage(deal);
    await payments.fault({ kind: '500', path: '/v1/checkout/sessions/*', count: 3 });
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('agreed');
    expect(await lotStateOf(deal)).toBe('reserved');
    await lapseAt(deal, 60);
    await performProviderTasksJob.run({ now: new Date(), log: logger });
    expect(await stateOf(deal)).toBe('lapsed');
    expect(await statusAtProvider(sessionId)).toBe('expired');
  });

  it('ends the session of which we never heard', async () => {
    const deal = await buildDeal();
    await inDeal(deal, (unit) => prepareCheckout({ dealId: deal.id }, unit));
    expect((await paymentOf(deal)).state).toBe('starting');
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('lapsed');
    const sessions = await payments.objects('checkout.session');
    const open = sessions.filter(
      ({ value }) => value['client_reference_id'] === deal.id && value['status'] === 'open',
    );
    expect(open).toEqual([]);
  });

  it('does not wait for ever for a session under whose key the provider keeps a failure', async () => {
    const deal = await buildDeal();
    await inDeal(deal, (unit) => prepareCheckout({ dealId: deal.id }, unit));
    await payments.fault({ kind: '500', path: '/v1/checkout/sessions', method: 'POST', stage: 'saved' });
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('lapsed');
  });

  it('happens once with two runners at a time', async () => {
    const deal = await buildDeal();
    await openPage(deal);
    await Promise.all([lapseAt(deal, 1), lapseAt(deal, 1)]);
    expect(await stateOf(deal)).toBe('lapsed');
    expect(await ProviderTask.count({ where: { dealId: deal.id, kind: 'expire_session' } })).toBe(1);
  });

  it('waits while the desk has frozen the deal', async () => {
    const deal = await buildDeal();
    await Deal.update({ frozenAt: new Date() }, { where: { id: deal.id } });
    await lapseAt(deal, 1);
    expect(await stateOf(deal)).toBe('agreed');
  });

  it('is refused before the deadline, with a session open, and once the deal is funded', async () => {
    const deal = await buildDeal();
    const lapse = () => inDeal(deal, (unit) => lapseDeal({ dealId: deal.id }, unit));
    await expect(lapse()).rejects.toMatchObject({ code: 'illegal-transition' });
    await openPage(deal);
    const { fundBy } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    pinDatabaseTime(new Date(fundBy.getTime() + 1));
    await expect(lapse()).rejects.toMatchObject({ code: 'illegal-transition' });
    const funded = await buildDeal({ state: 'funded' });
    await expect(inDeal(funded, (unit) => lapseDeal({ dealId: funded.id }, unit))).rejects.toMatchObject({
      code: 'illegal-transition',
    });
  });
});
