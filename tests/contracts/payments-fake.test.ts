import type Stripe from 'stripe';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { clientFor, failureOf, startKit } from './payments-fake-kit.ts';
import type { Kit } from './payments-fake-kit.ts';

// The published contract of the payment service, driven through its own SDK. Test card and bank numbers are the
// published ones.
let kit: Kit;
beforeAll(async () => {
  kit = await startKit();
});
afterAll(async () => {
  // Whatever the tests did, the books sum to zero and say the same as the balance transactions.
  const books = await kit.books();
  await kit.close();
  expect(books.sum).toBe(0);
  expect(books.differences).toEqual([]);
});

const eventTypes = async (account?: string): Promise<string[]> => {
  const list = await kit.stripe.events.list({ limit: 100 }, account ? { stripeAccount: account } : {});
  return list.data.map((event) => event.type);
};

describe('checkout', () => {
  it('opens a session with its total, page and one day to live', async () => {
    const session = await kit.openSession(12_345, { client_reference_id: 'deal-1', metadata: { deal: '1' } });
    expect(session).toMatchObject({
      object: 'checkout.session',
      amount_total: 12_345,
      client_reference_id: 'deal-1',
      metadata: { deal: '1' },
      payment_intent: null,
      payment_status: 'unpaid',
      status: 'open',
      url: `${kit.url}/pay/${session.id}`,
    });
    expect(session.expires_at - session.created).toBe(86_400);
    const items = await kit.stripe.checkout.sessions.listLineItems(session.id);
    expect(items.data.map((item) => [item.description, item.amount_total])).toEqual([
      ['Gold button', 12_345],
    ]);
  });

  it('completes when paid, with charge, fee and events', async () => {
    const session = await kit.openSession(10_000, {
      payment_intent_data: { transfer_group: 'g1', metadata: { deal: 'g1' } },
    });
    expect(await kit.control('pay', { sessionId: session.id })).toEqual({ outcome: 'paid' });
    const paid = await kit.stripe.checkout.sessions.retrieve(session.id, {
      expand: ['line_items', 'payment_intent.latest_charge.balance_transaction'],
    });
    expect([paid.status, paid.payment_status, paid.url]).toEqual(['complete', 'paid', null]);
    expect(paid.line_items?.data).toHaveLength(1);
    const intent = paid.payment_intent as Stripe.PaymentIntent;
    const charge = intent.latest_charge as Stripe.Charge;
    const entry = charge.balance_transaction as Stripe.BalanceTransaction;
    expect([intent.status, intent.amount_received, intent.metadata.deal]).toEqual([
      'succeeded',
      10_000,
      'g1',
    ]);
    expect([charge.paid, charge.captured, charge.transfer_group]).toEqual([true, true, 'g1']);
    // 2.9 % + 30 minor units.
    expect([entry.amount, entry.fee, entry.net, entry.status]).toEqual([10_000, 320, 9680, 'available']);
    expect((await eventTypes()).slice(0, 3)).toEqual([
      'checkout.session.completed',
      'payment_intent.succeeded',
      'charge.succeeded',
    ]);
  });

  it('takes the money once however often it is paid', async () => {
    const session = await kit.openSession();
    const results = await Promise.all([1, 2, 3].map(() => kit.control('pay', { sessionId: session.id })));
    const { payment_intent: intent } = await kit.stripe.checkout.sessions.retrieve(session.id);
    const charges = await kit.stripe.charges.list({ payment_intent: String(intent) });
    expect(results.filter((result) => (result as { outcome: string }).outcome === 'paid')).toHaveLength(1);
    expect(charges.data).toHaveLength(1);
  });

  it.each([
    ['4000000000000002', 'card_declined', 'generic_decline'],
    ['4000000000009995', 'card_declined', 'insufficient_funds'],
    ['4000000000000069', 'expired_card', 'expired_card'],
    ['4000000000000127', 'incorrect_cvc', 'incorrect_cvc'],
    ['4012888888881881', 'card_declined', 'test_mode_live_card'],
  ])('declines the card %s and lets the buyer try again', async (cardNumber, code, declineCode) => {
    const session = await kit.openSession();
    const refused = await kit.control('pay', { sessionId: session.id, cardNumber });
    expect(refused).toMatchObject({ outcome: 'declined', code, declineCode });
    const still = await kit.stripe.checkout.sessions.retrieve(session.id, { expand: ['payment_intent'] });
    expect(still.status).toBe('open');
    expect(still.payment_intent).toMatchObject({
      status: 'requires_payment_method',
      last_payment_error: { type: 'card_error', code, decline_code: declineCode },
    });
    expect(await kit.control('pay', { sessionId: session.id })).toEqual({ outcome: 'paid' });
  });

  it('expires an open session once and takes no payment afterwards', async () => {
    const session = await kit.openSession();
    const expired = await kit.stripe.checkout.sessions.expire(session.id);
    expect([expired.status, expired.url]).toEqual(['expired', null]);
    expect((await failureOf(kit.stripe.checkout.sessions.expire(session.id))).statusCode).toBe(400);
    expect(await kit.control('pay', { sessionId: session.id })).toEqual({
      outcome: 'closed',
      status: 'expired',
    });
  });

  it('refuses to cancel the payment intent of an open session and cancels it with the session', async () => {
    const session = await kit.openSession();
    await kit.control('pay', { sessionId: session.id, cardNumber: '4000000000000002' });
    const { payment_intent: id } = await kit.stripe.checkout.sessions.retrieve(session.id);
    const error = await failureOf(kit.stripe.paymentIntents.cancel(String(id)));
    expect(error.code).toBe('payment_intent_unexpected_state');
    await kit.stripe.checkout.sessions.expire(session.id);
    expect((await kit.stripe.paymentIntents.retrieve(String(id))).status).toBe('canceled');
  });

  it('refuses to expand what is no object', async () => {
    const session = await kit.openSession();
    const expand = ['success_url'];
    const error = await failureOf(kit.stripe.checkout.sessions.retrieve(session.id, { expand }));
    expect([error.statusCode, error.param]).toEqual([400, 'expand']);
  });
});

describe('idempotency', () => {
  const params = { type: 'express', metadata: { who: 'a' } } as const;

  it('replays the same answer under the same key', async () => {
    const first = await kit.stripe.accounts.create(params, { idempotencyKey: 'k-same' });
    const second = await kit.stripe.accounts.create(params, { idempotencyKey: 'k-same' });
    expect(second.id).toBe(first.id);
    expect(first.lastResponse.headers['idempotent-replayed']).toBeUndefined();
    expect(second.lastResponse.headers['idempotent-replayed']).toBe('true');
  });

  it('refuses other parameters under the key', async () => {
    await kit.stripe.accounts.create(params, { idempotencyKey: 'k-other' });
    const changed = kit.stripe.accounts.create({ type: 'express' }, { idempotencyKey: 'k-other' });
    const error = await failureOf(changed);
    expect([error.statusCode, error.type]).toEqual([400, 'StripeIdempotencyError']);
  });

  it('answers 409 while a twin is running', async () => {
    await kit.control('faults', { method: 'POST', path: '/v1/accounts', kind: 'delay', delayMs: 400 });
    const slow = kit.stripe.accounts.create(params, { idempotencyKey: 'k-twin' });
    await new Promise((resolve) => setTimeout(resolve, 100));
    const error = await failureOf(kit.stripe.accounts.create(params, { idempotencyKey: 'k-twin' }));
    expect(error.statusCode).toBe(409);
    const done = await slow;
    const again = await kit.stripe.accounts.create(params, { idempotencyKey: 'k-twin' });
    expect(again.id).toBe(done.id);
  });

  it('keeps a refusal by state but not one by bad input', async () => {
    const charge = await kit.paidCharge(1000);
    const wrong = { charge: charge.id, amount: 1001 };
    await failureOf(kit.stripe.refunds.create(wrong, { idempotencyKey: 'k-burnt' }));
    const raw = await fetch(`${kit.url}/v1/refunds`, {
      method: 'POST',
      headers: { authorization: 'Bearer sk_test_contract', 'idempotency-key': 'k-burnt' },
      body: `charge=${charge.id}&amount=1001`,
    });
    expect([raw.status, raw.headers.get('idempotent-replayed')]).toEqual([400, 'true']);
    await failureOf(kit.stripe.refunds.create({} as never, { idempotencyKey: 'k-free' }));
    const refund = await kit.stripe.refunds.create({ charge: charge.id }, { idempotencyKey: 'k-free' });
    expect(refund.status).toBe('succeeded');
  });

  it('scopes keys by account', async () => {
    const [a, b] = [await kit.payee(), await kit.payee()];
    const charge = await kit.paidCharge();
    for (const { id: destination } of [a, b]) {
      const source = { source_transaction: charge.id, amount: 1000, currency: 'usd' };
      await kit.stripe.transfers.create({ ...source, destination });
    }
    const payout = (stripeAccount: string) =>
      kit.stripe.payouts.create(
        { amount: 500, currency: 'usd' },
        { stripeAccount, idempotencyKey: 'k-scope' },
      );
    expect((await payout(a.id)).id).not.toBe((await payout(b.id)).id);
  });

  it('forgets a key after a day', async () => {
    const own = await startKit();
    const first = await own.stripe.accounts.create(params, { idempotencyKey: 'k-old' });
    await own.control('clock', { advanceSeconds: 86_401 });
    const second = await own.stripe.accounts.create(params, { idempotencyKey: 'k-old' });
    await own.close();
    expect(second.id).not.toBe(first.id);
  });
});

describe('refunds', () => {
  it('refunds in parts, never over the charge, and keeps the fee', async () => {
    const charge = await kit.paidCharge(10_000);
    const before = (await kit.books()).balances;
    const part = await kit.stripe.refunds.create({
      payment_intent: String(charge.payment_intent),
      amount: 4000,
    });
    expect([part.status, part.amount, part.charge]).toEqual(['succeeded', 4000, charge.id]);
    const over = await failureOf(kit.stripe.refunds.create({ charge: charge.id, amount: 6001 }));
    expect([over.statusCode, over.param]).toEqual([400, 'amount']);
    await kit.stripe.refunds.create({ charge: charge.id });
    const again = await failureOf(kit.stripe.refunds.create({ charge: charge.id }));
    expect(again.code).toBe('charge_already_refunded');
    const done = await kit.stripe.charges.retrieve(charge.id, { expand: ['refunds'] });
    expect([done.amount_refunded, done.refunded, done.refunds?.data.length]).toEqual([10_000, true, 2]);
    const after = (await kit.books()).balances;
    expect((before.platform ?? 0) - (after.platform ?? 0)).toBe(10_000);
    expect(after['provider:fees']).toBe(before['provider:fees']);
    expect((await eventTypes()).slice(0, 3)).toEqual(['refund.updated', 'charge.refunded', 'refund.created']);
  });

  it('gives the money back when a refund fails later', async () => {
    const charge = await kit.paidCharge(2000);
    const refund = await kit.stripe.refunds.create({ charge: charge.id });
    const before = (await kit.books()).balances.platform ?? 0;
    await kit.control(`refunds/${refund.id}/fail`);
    const failed = await kit.stripe.refunds.retrieve(refund.id);
    expect([failed.status, failed.failure_reason]).toEqual(['failed', 'lost_or_stolen_card']);
    expect(((await kit.books()).balances.platform ?? 0) - before).toBe(2000);
    expect((await eventTypes())[0]).toBe('refund.failed');
  });
});

describe('transfers', () => {
  it('moves the named part of a charge and finds it by its group', async () => {
    const charge = await kit.paidCharge(10_000, 'group-7');
    const account = await kit.payee();
    const transfer = await kit.stripe.transfers.create({
      amount: 9600,
      currency: 'usd',
      destination: account.id,
      source_transaction: charge.id,
      metadata: { deal: '7' },
    });
    expect(transfer).toMatchObject({
      amount: 9600,
      amount_reversed: 0,
      transfer_group: 'group-7',
      reversed: false,
    });
    const found = await kit.stripe.transfers.list({ transfer_group: 'group-7' });
    expect(found.data.map((row) => row.id)).toEqual([transfer.id]);
    const balance = await kit.stripe.balance.retrieve({}, { stripeAccount: account.id });
    expect(balance.available[0]?.amount).toBe(9600);
    const over = await failureOf(
      kit.stripe.transfers.create({
        amount: 401,
        currency: 'usd',
        destination: account.id,
        source_transaction: charge.id,
      }),
    );
    expect([over.statusCode, over.code]).toEqual([400, 'balance_insufficient']);
    expect((await eventTypes())[0]).toBe('transfer.created');
  });

  it('refuses an account that has not been onboarded', async () => {
    const account = await kit.newAccount();
    const params = { amount: 100, currency: 'usd', destination: account.id };
    const error = await failureOf(kit.stripe.transfers.create(params));
    expect(error.code).toBe('insufficient_capabilities_for_transfer');
  });

  it('reverses in parts and refuses what the destination has not', async () => {
    const charge = await kit.paidCharge(10_000);
    const account = await kit.payee();
    const transfer = await kit.stripe.transfers.create({
      amount: 5000,
      currency: 'usd',
      destination: account.id,
      source_transaction: charge.id,
    });
    await kit.stripe.transfers.createReversal(transfer.id, { amount: 2000 });
    const part = await kit.stripe.transfers.retrieve(transfer.id);
    expect([part.amount_reversed, part.reversed, part.reversals.data.length]).toEqual([2000, false, 1]);
    const over = await failureOf(kit.stripe.transfers.createReversal(transfer.id, { amount: 3001 }));
    expect(over.statusCode).toBe(400);
    const stripeAccount = account.id;
    await kit.stripe.payouts.create({ amount: 3000, currency: 'usd' }, { stripeAccount });
    const empty = await failureOf(kit.stripe.transfers.createReversal(transfer.id));
    expect(empty.code).toBe('balance_insufficient');
  });

  it('needs available money unless a charge is named, which settles later', async () => {
    const own = await startKit({ settlementDelaySeconds: 172_800 });
    const charge = await own.paidCharge(10_000);
    const account = await own.payee();
    const params = { amount: 1000, currency: 'usd', destination: account.id };
    expect((await failureOf(own.stripe.transfers.create(params))).code).toBe('balance_insufficient');
    await own.stripe.transfers.create({ ...params, source_transaction: charge.id });
    const stripeAccount = account.id;
    const read = async () => {
      const balance = await own.stripe.balance.retrieve({}, { stripeAccount });
      return [balance.available[0]?.amount, balance.pending[0]?.amount];
    };
    expect(await read()).toEqual([0, 1000]);
    const early = own.stripe.payouts.create({ amount: 1000, currency: 'usd' }, { stripeAccount });
    expect((await failureOf(early)).code).toBe('balance_insufficient');
    await own.control('clock', { advanceSeconds: 172_800 });
    expect(await read()).toEqual([1000, 0]);
    await own.stripe.transfers.create(params);
    const books = await own.books();
    await own.close();
    expect([books.sum, books.differences]).toEqual([0, []]);
  });
});

describe('accounts', () => {
  it('asks for details until the onboarding is done', async () => {
    const account = await kit.newAccount();
    expect(account).toMatchObject({
      type: 'express',
      details_submitted: false,
      payouts_enabled: false,
      capabilities: { transfers: 'inactive' },
      settings: { payouts: { schedule: { interval: 'manual' } } },
    });
    expect(account.requirements?.currently_due).toContain('external_account');
    await kit.control('onboard', { accountId: account.id });
    const ready = await kit.stripe.accounts.retrieve(account.id);
    expect(ready).toMatchObject({
      details_submitted: true,
      payouts_enabled: true,
      capabilities: { transfers: 'active' },
    });
    const capability = await kit.stripe.accounts.retrieveCapability(account.id, 'transfers');
    const banks = await kit.stripe.accounts.listExternalAccounts(account.id);
    expect([capability.status, banks.data.map((bank) => bank.last4)]).toEqual(['active', ['6789']]);
    expect(await eventTypes(account.id)).toEqual(['account.updated', 'account.external_account.created']);
    expect(await eventTypes()).not.toContain('account.updated');
  });
});

describe('payouts', () => {
  const paidOut = async (bank?: string) => {
    const account = await kit.payee(bank);
    const charge = await kit.paidCharge(10_000);
    const stripeAccount = account.id;
    const source = { source_transaction: charge.id, destination: account.id };
    await kit.stripe.transfers.create({ ...source, amount: 9000, currency: 'usd' });
    const payout = await kit.stripe.payouts.create({ amount: 9000, currency: 'usd' }, { stripeAccount });
    const read = () => kit.stripe.payouts.retrieve(payout.id, {}, { stripeAccount });
    const available = async () =>
      (await kit.stripe.balance.retrieve({}, { stripeAccount })).available[0]?.amount;
    return { account, payout, read, available };
  };

  it('goes from pending over in_transit to paid by the clock', async () => {
    const { account, payout, read, available } = await paidOut();
    expect([payout.status, payout.automatic, await available()]).toEqual(['pending', false, 0]);
    await kit.control('clock', { advanceSeconds: 0 });
    expect((await read()).status).toBe('in_transit');
    await kit.control('clock', { advanceSeconds: 60 });
    expect((await read()).status).toBe('paid');
    const told = (await eventTypes(account.id)).slice(0, 3);
    expect(told).toEqual(['payout.paid', 'payout.updated', 'payout.created']);
    const hidden = await failureOf(kit.stripe.payouts.retrieve(payout.id));
    expect(hidden.statusCode).toBe(404);
  });

  it('fails at a bank that has no such account, gives the money back and breaks the bank account', async () => {
    const { account, read, available } = await paidOut('000111111116');
    await kit.control('clock', { advanceSeconds: 60 });
    const failed = await read();
    expect([failed.status, failed.failure_code, await available()]).toEqual(['failed', 'no_account', 9000]);
    expect(failed.failure_balance_transaction).toMatch(/^txn_/);
    const broken = await kit.stripe.accounts.retrieve(account.id);
    expect([broken.payouts_enabled, broken.external_accounts?.data[0]]).toMatchObject([
      false,
      { status: 'errored' },
    ]);
    const again = kit.stripe.payouts.create({ amount: 1, currency: 'usd' }, { stripeAccount: account.id });
    expect((await failureOf(again)).code).toBe('payouts_not_allowed');
    await kit.stripe.accounts.createExternalAccount(account.id, {
      external_account: {
        object: 'bank_account',
        country: 'US',
        currency: 'usd',
        account_number: '000123456789',
        routing_number: '110000000',
      } as never,
    });
    expect((await kit.stripe.accounts.retrieve(account.id)).payouts_enabled).toBe(true);
  });

  it('may fail after it was paid, and not twice', async () => {
    const { account, payout, read, available } = await paidOut();
    await kit.control(`payouts/${payout.id}/pay`);
    expect((await read()).status).toBe('paid');
    await kit.control(`payouts/${payout.id}/fail`);
    await kit.control(`payouts/${payout.id}/fail`);
    const failed = await read();
    expect([failed.status, failed.failure_code, await available()]).toEqual([
      'failed',
      'could_not_process',
      9000,
    ]);
    const told = (await eventTypes(account.id)).filter((type) => type === 'payout.failed');
    expect(told).toHaveLength(1);
  });

  it('refuses more than the available balance', async () => {
    const account = await kit.payee();
    const call = kit.stripe.payouts.create({ amount: 1, currency: 'usd' }, { stripeAccount: account.id });
    expect((await failureOf(call)).code).toBe('balance_insufficient');
  });
});

describe('disputes', () => {
  const dispute = async (minor: number) => {
    const session = await kit.openSession(minor);
    await kit.control('pay', { sessionId: session.id, cardNumber: '4000000000000259' });
    const paid = await kit.stripe.checkout.sessions.retrieve(session.id, { expand: ['payment_intent'] });
    const charge = String((paid.payment_intent as Stripe.PaymentIntent).latest_charge);
    const opened = (await kit.stripe.disputes.list({ charge })).data[0] as Stripe.Dispute;
    return { charge, opened };
  };
  const platform = async () => (await kit.books()).balances.platform ?? 0;

  it('takes sum and fee at once and refuses a refund beside it', async () => {
    const before = await platform();
    const { charge, opened } = await dispute(10_000);
    expect([opened.status, opened.amount, opened.reason]).toEqual(['needs_response', 10_000, 'fraudulent']);
    // Paid 10,000 less the card fee of 320; then 10,000 and 1,500 leave.
    expect((await platform()) - before).toBe(-320 - 1500);
    expect((await failureOf(kit.stripe.refunds.create({ charge }))).code).toBe('charge_disputed');
    expect((await eventTypes()).slice(0, 2)).toEqual([
      'charge.dispute.funds_withdrawn',
      'charge.dispute.created',
    ]);
  });

  it('brings the sum back when won, never the fee', async () => {
    const before = await platform();
    const { charge, opened } = await dispute(10_000);
    const answered = await kit.stripe.disputes.update(opened.id, { evidence: { shipping_carrier: 'Post' } });
    expect(answered.status).toBe('under_review');
    await kit.control(`disputes/${opened.id}/won`);
    expect((await kit.stripe.disputes.retrieve(opened.id)).status).toBe('won');
    expect((await kit.stripe.charges.retrieve(charge)).disputed).toBe(false);
    expect((await platform()) - before).toBe(10_000 - 320 - 1500);
    expect((await failureOf(kit.stripe.disputes.close(opened.id))).statusCode).toBe(400);
  });

  it('is lost when closed', async () => {
    const { opened } = await dispute(5000);
    expect((await kit.stripe.disputes.close(opened.id)).status).toBe('lost');
    expect((await eventTypes())[0]).toBe('charge.dispute.closed');
  });
});

describe('lists and balances', () => {
  it('pages through a list without gap or repeat, both ways', async () => {
    const own = await startKit();
    const made: string[] = [];
    for (let index = 0; index < 7; index += 1) made.unshift((await own.newAccount()).id);
    const seen: string[] = [];
    for await (const account of own.stripe.accounts.list({ limit: 3 })) seen.push(account.id);
    const newer = await own.stripe.accounts.list({ limit: 2, ending_before: made[4] as string });
    await own.close();
    expect(seen).toEqual(made);
    expect([newer.data.map((account) => account.id), newer.has_more]).toEqual([made.slice(2, 4), true]);
  });

  it('has a balance that is the sum of its balance transactions and of the books', async () => {
    const balance = await kit.stripe.balance.retrieve();
    let net = 0;
    for await (const row of kit.stripe.balanceTransactions.list({ limit: 100 })) net += row.net;
    const { balances, journals } = await kit.books();
    const shown = (balance.available[0]?.amount ?? 0) + (balance.pending[0]?.amount ?? 0);
    expect(net).toBe(shown);
    expect(balances.platform).toBe(shown);
    expect(journals.length).toBeGreaterThan(0);
    for (const { legs } of journals) expect((legs[0]?.amount ?? 0) + (legs[1]?.amount ?? 0)).toBe(0);
  });

  it('expands rows of a list', async () => {
    const charge = await kit.paidCharge(1500);
    const list = await kit.stripe.charges.list({ limit: 1, expand: ['data.balance_transaction'] });
    expect(list.data[0]?.id).toBe(charge.id);
    expect(list.data[0]?.balance_transaction).toMatchObject({ object: 'balance_transaction', amount: 1500 });
  });

  it('speaks the version of the SDK', async () => {
    const event = (await clientFor(kit.port).events.list({ limit: 1 })).data[0];
    expect(event?.api_version).toBe('2026-10-28.endive');
  });
});
