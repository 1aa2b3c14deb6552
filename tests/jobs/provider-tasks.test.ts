import { randomUUID } from 'node:crypto';
import { afterEach, describe, expect, it } from 'vitest';
import { runProviderTasks } from '#jobs/run-provider-tasks.ts';
import { databaseNow, pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { cancelDeal } from '#server/features/deals/cancel-deal.ts';
import { settleDeal } from '#server/features/deals/settle-deal.ts';
import { accountSumMinor, dealLedger, heldMinor } from '#server/features/ledger/ledger-queries.ts';
import {
  TASK_LEASE_SECONDS,
  claimProviderTask,
  holdsLease,
} from '#server/features/provider-tasks/claim-provider-task.ts';
import { TASK_TRIES_MAX, backoffSeconds } from '#server/features/provider-tasks/end-provider-task.ts';
import { PAYMENT_TASK_HANDLERS } from '#server/features/payments/payment-task-handlers.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Deal } from '#server/models/deal.ts';
import { Payment } from '#server/models/payment.ts';
import { ProviderTask } from '#server/models/provider-task.ts';
import { Refund } from '#server/models/refund.ts';
import { buildDeal, inDeal, type BuiltDeal } from '#tests/factories/build-deal.ts';
import { dealLedgerTable } from '#tests/helpers/ledger-table.ts';
import { eventually, startPayments } from '#tests/helpers/payments-fake.ts';
import { startTestApp } from '#tests/helpers/test-app.ts';

const app = await startTestApp();
const payments = await startPayments(app.url);

afterEach(async () => {
  pinDatabaseTime(null);
  await payments.noFaults();
});

const run = (deal: BuiltDeal) => runProviderTasks(PAYMENT_TASK_HANDLERS, { dealIds: [deal.id] });

/** Paid for real at the stand-in, with a seller whom it can pay. */
async function fundedDeal() {
  const seller = await payments.seller();
  const deal = await buildDeal({ seller });
  const buyer = await app.signIn(deal.buyer);
  await buyer.post(`/api/v1/deals/${deal.code}/payment`, {}, { 'Idempotency-Key': randomUUID() }).expect(200);
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  await payments.pay(payment.providerSessionId ?? '');
  await becomes(deal, 'funded');
  return { ...deal, seller };
}

const becomes = (deal: BuiltDeal, state: Deal['state']) =>
  eventually(async () => expect((await Deal.findByPk(deal.id, { rejectOnEmpty: true })).state).toBe(state));

async function settledDeal() {
  const deal = await fundedDeal();
  await inDeal(deal, async (unit) => {
    const row = await Deal.findByPk(deal.id, { transaction: unit.tx, rejectOnEmpty: true });
    await row.update({ state: 'accepted' }, { transaction: unit.tx });
    await settleDeal(row, { actorKind: 'buyer', actorId: deal.buyer.id }, unit);
  });
  return deal;
}

async function cancelledDeal() {
  const deal = await fundedDeal();
  await inDeal(deal, async (unit) => {
    const row = await Deal.findByPk(deal.id, { transaction: unit.tx, rejectOnEmpty: true });
    await cancelDeal(row, { reason: 'Not shipped in time.', act: 'cancelled', actorKind: 'clock' }, unit);
  });
  return deal;
}

const taskOf = (deal: BuiltDeal, kind: ProviderTask['kind']) =>
  ProviderTask.findOne({ where: { dealId: deal.id, kind }, rejectOnEmpty: true });

async function transfersOf(deal: BuiltDeal) {
  const transfers = await payments.objects('transfer');
  return transfers.filter(({ value }) => value['transfer_group'] === deal.code);
}

async function refundsOf(deal: BuiltDeal) {
  const payment = await Payment.findOne({ where: { dealId: deal.id }, rejectOnEmpty: true });
  const refunds = await payments.objects('refund');
  return refunds.filter(({ value }) => value['payment_intent'] === payment.paymentIntentId);
}

/** The next try of a task, as if its pause were over. */
async function makeDue(deal: BuiltDeal) {
  await ProviderTask.update({ nextAt: new Date(0) }, { where: { dealId: deal.id, state: 'due' } });
}

describe('transfer and payout', () => {
  it('are done and booked once with ten runners at a time', async () => {
    const deal = await settledDeal();
    await Promise.all(Array.from({ length: 10 }, () => run(deal)));
    await becomes(deal, 'paid_out');
    expect(await transfersOf(deal)).toHaveLength(1);
    const { totalMinor, commissionMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(BigInt((await transfersOf(deal))[0]!.value['amount'] as number)).toBe(
      totalMinor - commissionMinor,
    );
    const table = await dealLedgerTable(deal.id);
    expect(table.match(/^\w+( \w+)?(?= {2})/gm)).toEqual([
      'what',
      'funding',
      'provider fee',
      'settlement',
      'transfer',
      'payout',
    ]);
    expect(await payments.balance(deal.seller.accountId)).toBe(0n);
  });

  it.each(['500', '429', 'reset', 'html'] as const)(
    'come to one effect when the provider answers %s, before or after it acted',
    async (kind) => {
      const deal = await settledDeal();
      await payments.fault({ kind, path: '/v1/transfers', method: 'POST', count: 3, stage: 'before' });
      await run(deal);
      await makeDue(deal);
      await payments.fault({ kind, path: '/v1/transfers', method: 'POST', count: 1, stage: 'after' });
      await payments.fault({ kind, path: '/v1/payouts', method: 'POST', count: 1, stage: 'after' });
      for (let turn = 0; turn < 5; turn += 1) {
        await run(deal);
        await makeDue(deal);
      }
      await becomes(deal, 'paid_out');
      expect(await transfersOf(deal)).toHaveLength(1);
      expect((await dealLedger(deal.id)).filter(({ kind: what }) => what === 'transfer')).toHaveLength(2);
    },
  );

  it('take another key after a definite refusal, and look first whether it was done', async () => {
    const deal = await settledDeal();
    await payments.fault({ kind: '402', path: '/v1/transfers', method: 'POST', count: 1 });
    await run(deal);
    const refused = await taskOf(deal, 'transfer');
    expect(refused).toMatchObject({ state: 'due', keyVersion: 2, tries: 1 });
    expect(refused.lastError).toContain('card_declined');
    await makeDue(deal);
    await run(deal);
    await becomes(deal, 'paid_out');
    expect(await transfersOf(deal)).toHaveLength(1);
  });

  it('find a transfer that was made more than a day ago, when the provider has forgotten the key', async () => {
    const deal = await settledDeal();
    await payments.fault({ kind: '500', path: '/v1/transfers', method: 'POST', count: 1, stage: 'after' });
    await payments.fault({ kind: '500', path: '/v1/transfers', method: 'POST', count: 2, stage: 'before' });
    const claimed = await withTransaction({}, async (unit) =>
      claimProviderTask({ taskId: (await taskOf(deal, 'transfer')).id, owner: 'killed' }, unit),
    );
    await PAYMENT_TASK_HANDLERS.transfer
      .effect(claimed!, { key: claimed!.idempotencyKey, isRepeat: false })
      .catch(() => undefined);
    expect(await transfersOf(deal)).toHaveLength(1);
    await payments.noFaults();
    await payments.control('clock', { advanceSeconds: 25 * 3600 });
    pinDatabaseTime(new Date(Date.now() + 25 * 3_600_000));
    await run(deal);
    await becomes(deal, 'paid_out');
    expect(await transfersOf(deal)).toHaveLength(1);
    expect(await taskOf(deal, 'transfer')).toMatchObject({ state: 'done', keyVersion: 2 });
  });
});

describe('a claim', () => {
  it('is won by one of ten, and handed over when the lease runs out', async () => {
    const deal = await settledDeal();
    const taskId = (await taskOf(deal, 'transfer')).id;
    const claim = (owner: string) =>
      withTransaction({}, (unit) => claimProviderTask({ taskId, owner }, unit));
    const claims = await Promise.all(Array.from({ length: 10 }, (_, index) => claim(`runner-${index}`)));
    const won = claims.filter((task) => task !== null);
    expect(won).toHaveLength(1);
    pinDatabaseTime(new Date((await databaseNow()).getTime() + (TASK_LEASE_SECONDS + 1) * 1000));
    const next = await claim('runner-next');
    expect(next?.leaseToken).toBe(won[0]!.leaseToken + 1);
    expect(await withTransaction({}, (unit) => holdsLease(won[0]!, unit))).toBe(false);
    expect(await withTransaction({}, (unit) => holdsLease(next!, unit))).toBe(true);
  });

  it('that was lost books nothing: the newer one does, once', async () => {
    const deal = await settledDeal();
    let isFirst = true;
    const slow = {
      transfer: {
        ...PAYMENT_TASK_HANDLERS.transfer,
        effect: async (...call: Parameters<typeof PAYMENT_TASK_HANDLERS.transfer.effect>) => {
          const result = await PAYMENT_TASK_HANDLERS.transfer.effect(...call);
          if (isFirst) {
            isFirst = false;
            pinDatabaseTime(new Date(Date.now() + (TASK_LEASE_SECONDS + 5) * 1000));
            await run(deal);
          }
          return result;
        },
      },
    };
    const counts = await runProviderTasks(slow, { dealIds: [deal.id] });
    expect(counts).toMatchObject({ lost: 1, done: 0 });
    expect(await transfersOf(deal)).toHaveLength(1);
    expect((await dealLedger(deal.id)).filter(({ kind }) => kind === 'transfer')).toHaveLength(2);
  });

  it('is given up after the last try, which the admins can see', async () => {
    const deal = await settledDeal();
    await ProviderTask.update({ tries: TASK_TRIES_MAX - 1 }, { where: { dealId: deal.id } });
    await payments.fault({ kind: '500', path: '/v1/transfers', method: 'POST', count: 3 });
    expect(await run(deal)).toMatchObject({ given_up: 1 });
    expect((await taskOf(deal, 'transfer')).state).toBe('given_up');
    const told = await AuditEntry.findOne({
      where: { act: 'give-up-provider-task', subjectId: deal.code },
      rejectOnEmpty: true,
    });
    expect(told.detail).toMatchObject({ kind: 'transfer', tries: TASK_TRIES_MAX });
  });

  it('is not even tried for the rest while the service is down', async () => {
    const deals = [];
    for (let index = 0; index < 5; index += 1) deals.push(await settledDeal());
    await payments.fault({ kind: '429', path: '/v1/transfers', method: 'POST', count: 100 });
    const counts = await runProviderTasks(PAYMENT_TASK_HANDLERS, { dealIds: deals.map(({ id }) => id) });
    expect(counts).toMatchObject({ due: 3, done: 0 });
  });

  it('comes back ever later, up to six hours and a little', () => {
    const pauses = Array.from({ length: TASK_TRIES_MAX }, (_, index) => backoffSeconds(index + 1, 0.5));
    expect(pauses.slice(0, 4)).toEqual([5, 10, 20, 40]);
    expect(Math.max(...pauses)).toBe(6 * 3600);
    const days = pauses.reduce((sum, seconds) => sum + seconds, 0) / 86_400;
    expect(days).toBeGreaterThan(28);
    expect(days).toBeLessThan(32);
    expect(backoffSeconds(200, 1)).toBe(27_000);
  });
});

describe('a refund', () => {
  it('goes back once, in full, with ten runners at a time, and the books agree', async () => {
    const deal = await cancelledDeal();
    const { totalMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    await Promise.all(Array.from({ length: 10 }, () => run(deal)));
    expect(await heldMinor(deal.id)).toBe(0n);
    const refunds = await refundsOf(deal);
    expect(refunds.map(({ value }) => BigInt(value['amount'] as number))).toEqual([totalMinor]);
    expect(await accountSumMinor({ kind: 'provider' })).toBe(await payments.balance('platform'));
  });

  it('is found again whose answer was lost for good', async () => {
    const deal = await cancelledDeal();
    await payments.fault({ kind: 'reset', path: '/v1/refunds', method: 'POST', count: 1, stage: 'after' });
    await run(deal);
    expect(await refundsOf(deal)).toHaveLength(1);
    expect(await Refund.findOne({ where: { dealId: deal.id } })).toMatchObject({ state: 'succeeded' });
  });

  it('that came back is held again and told to the admins, once', async () => {
    const deal = await cancelledDeal();
    await run(deal);
    const [refund] = await refundsOf(deal);
    await payments.control(`refunds/${refund!.id}/fail`);
    await eventually(async () =>
      expect(await Refund.findOne({ where: { dealId: deal.id } })).toMatchObject({ state: 'failed' }),
    );
    const { totalMinor } = await Deal.findByPk(deal.id, { rejectOnEmpty: true });
    expect(await heldMinor(deal.id)).toBe(totalMinor);
    expect(await AuditEntry.count({ where: { act: 'note-failed-refund', subjectId: deal.code } })).toBe(1);
  });
});
