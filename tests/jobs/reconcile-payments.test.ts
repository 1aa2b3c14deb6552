import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { dealSumsCheck } from '#jobs/checks/deal-sums.ts';
import { escrowEndedCheck } from '#jobs/checks/escrow-ended.ts';
import { providerBalanceCheck } from '#jobs/checks/provider-balance.ts';
import { singleReleaseCheck } from '#jobs/checks/single-release.ts';
import { performProviderTasksJob } from '#jobs/perform-provider-tasks.ts';
import { reconcilePaymentsJob } from '#jobs/reconcile-payments.ts';
import { runChecksJob } from '#jobs/run-checks.ts';
import { runJob } from '#jobs/run-job.ts';
import { newId } from '#server/database/ids.ts';
import { pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { settleDeal } from '#server/features/deals/settle-deal.ts';
import { accountSumMinor } from '#server/features/ledger/ledger-queries.ts';
import { postJournal } from '#server/features/ledger/post-journal.ts';
import { reverseJournal } from '#server/features/ledger/reverse-journal.ts';
import { paymentClient } from '#server/integrations/clients.ts';
import { PaymentProviderError } from '#server/integrations/payment-errors.ts';
import { createPaymentClient } from '#server/integrations/payments.ts';
import { env } from '#server/env.ts';
import { logger } from '#server/logger.ts';
import { Deal } from '#server/models/deal.ts';
import { JobLease } from '#server/models/job-lease.ts';
import { Payment } from '#server/models/payment.ts';
import { Refund } from '#server/models/refund.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

afterEach(async () => {
  pinDatabaseTime(null);
  await payments.noFaults();
});

const stateOf = async ({ id }: BuiltDeal) => (await Deal.findByPk(id, { rejectOnEmpty: true })).state;

/** The job after so many minutes of silence. */
function reconcileAfter(minutes: number) {
  const now = new Date(Date.now() + minutes * 60_000);
  pinDatabaseTime(now);
  return reconcilePaymentsJob.run({ now, log: logger });
}

const perform = () => performProviderTasksJob.run({ now: new Date(), log: logger });

async function openPage(deal: BuiltDeal): Promise<string> {
  const buyer = await app.signIn(deal.buyer);
  await buyer.post(`/api/v1/deals/${deal.code}/payment`, {}, { 'Idempotency-Key': randomUUID() }).expect(200);
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  return payment.providerSessionId ?? '';
}

describe('reconciliation, when no message ever comes', () => {
  it('reaches the same end as the messages would have', async () => {
    await payments.webhooks('drop');
    const seller = await payments.seller();
    const deal = await buildDeal({ seller });
    await payments.pay(await openPage(deal));
    expect(await reconcilePaymentsJob.run({ now: new Date(), log: logger })).toMatchObject({ changed: 0 });
    expect(await reconcileAfter(2)).toMatchObject({ changed: 1 });
    expect(await stateOf(deal)).toBe('funded');
    pinDatabaseTime(null);
    await inDeal(deal, async (unit) => {
      const row = await Deal.findByPk(deal.id, { transaction: unit.tx, rejectOnEmpty: true });
      await row.update({ state: 'accepted' }, { transaction: unit.tx });
      await settleDeal(row, { actorKind: 'buyer', actorId: deal.buyer.id }, unit);
    });
    await perform();
    expect(await stateOf(deal)).toBe('settled');
    await payments.control('clock', { advanceSeconds: 60 });
    await reconcileAfter(2);
    expect(await stateOf(deal)).toBe('paid_out');
    expect(await reconcileAfter(4)).toMatchObject({ changed: 0 });
    expect(await accountSumMinor({ kind: 'provider' })).toBe(await payments.balance('platform'));
  });

  it('leaves what the provider does not answer for the next time', async () => {
    const deal = await buildDeal();
    await payments.pay(await openPage(deal));
    await payments.fault({ kind: '500', path: '/v1/checkout/sessions/*', method: 'GET', count: 3 });
    expect(await reconcileAfter(2)).toMatchObject({ unanswered: 1 });
    await reconcileAfter(2);
    expect(await stateOf(deal)).toBe('funded');
  });
});

describe('the checks', () => {
  it('find nothing where the books agree, and the job keeps what it found', async () => {
    expect(await runJob(runChecksJob)).toEqual({ checks: 6, breaches: {}, unanswered: [] });
    const lease = await JobLease.findByPk('run-checks', { rejectOnEmpty: true });
    expect(lease).toMatchObject({ lastOutcome: 'done', lastDetail: { checks: 6, breaches: {} } });
  });

  it('go on without the provider while it does not answer', async () => {
    await payments.fault({ kind: '429', path: '/v1/balance', count: 1 });
    expect(await runChecksJob.run({ now: new Date(), log: logger })).toEqual({
      checks: 6,
      breaches: {},
      unanswered: ['provider-balance'],
    });
  });

  it('find money that the provider does not know of', async () => {
    const entries = [
      { account: { kind: 'provider' }, amountMinor: 5n },
      { account: { kind: 'commission' }, amountMinor: -5n },
    ] as const;
    const uniqueKey = newId();
    await withTransaction({}, (unit) =>
      postJournal({ kind: 'settlement', dealId: null, uniqueKey, memo: 'test', entries }, unit),
    );
    const found = await providerBalanceCheck(10).find();
    expect(found).toHaveLength(1);
    expect(found[0]).toMatch(/^our books say .+, the provider says .+$/);
    await withTransaction({}, (unit) => reverseJournal({ uniqueKey, memo: 'test' }, unit));
    expect(await providerBalanceCheck(10).find()).toEqual([]);
  });

  it('find an ended deal that still holds money, and one whose payment row disagrees', async () => {
    const deal = await buildDeal({ state: 'funded' });
    await Deal.update({ state: 'cancelled', liveLotId: null }, { where: { id: deal.id } });
    expect(await escrowEndedCheck.find()).toEqual([expect.stringContaining(deal.code)]);
    await Payment.update({ amountMinor: 1n }, { where: { dealId: deal.id } });
    expect(await dealSumsCheck.find()).toEqual([expect.stringContaining(deal.code)]);
  });

  it('find a deal that was both released and refunded', async () => {
    const deal = await buildDeal({ state: 'settled' });
    expect(await singleReleaseCheck.find()).toEqual([]);
    await Refund.create({ id: newId(), dealId: deal.id, amountMinor: 1n, state: 'due', reason: 'test' });
    expect(await singleReleaseCheck.find()).toEqual([`deal ${deal.code} was both released and refunded`]);
  });
});

describe("the provider's client", () => {
  const impatient = () =>
    createPaymentClient({
      secretKey: env.STRIPE_SECRET_KEY,
      webhookSecret: env.STRIPE_WEBHOOK_SECRET,
      apiBase: env.STRIPE_API_BASE,
      timeoutMs: 150,
    });

  it.each([
    ['500', 'unavailable'],
    ['409', 'unavailable'],
    ['429', 'unavailable'],
    ['402', 'refused'],
    ['reset', 'unavailable'],
    ['html', 'unavailable'],
    ['hang', 'unavailable'],
  ] as const)('answers %s as %s, in bounded time', async (kind, expected) => {
    await payments.fault({ kind, path: '/v1/balance', count: 3 });
    const began = Date.now();
    const failure = await impatient()
      .readBalance()
      .catch((error: unknown) => error);
    expect(failure).toBeInstanceOf(PaymentProviderError);
    expect(failure).toMatchObject({ kind: expected });
    expect(Date.now() - began).toBeLessThan(6_000);
  });

  it('tells an unknown object and a wrong key apart from no answer', async () => {
    await expect(paymentClient().readAccount('acct_nobody')).rejects.toMatchObject({
      kind: 'refused',
      code: 'resource_missing',
    });
    const wrong = createPaymentClient({
      secretKey: 'not-a-key',
      webhookSecret: 'x',
      apiBase: env.STRIPE_API_BASE,
    });
    await expect(wrong.readBalance()).rejects.toMatchObject({ kind: 'unavailable' });
  });

  it('calls the same key for something else a conflict', async () => {
    const order = { email: 'a@scruple.example', memberId: 'a', idempotencyKey: `k:${randomUUID()}` };
    await paymentClient().createAccount(order);
    await expect(paymentClient().createAccount({ ...order, memberId: 'b' })).rejects.toMatchObject({
      kind: 'conflict',
    });
  });
});
