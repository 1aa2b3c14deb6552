import type Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { startKit, startReceiver, waitFor } from './payments-fake-kit.ts';
import type { Kit } from './payments-fake-kit.ts';

let kit: Kit;
let receiver: Awaited<ReturnType<typeof startReceiver>>;
beforeEach(async () => {
  receiver = await startReceiver();
  kit = await startKit({ webhookUrl: receiver.url });
});
afterEach(async () => {
  await kit.close();
  await receiver.close();
});

const pay = async (): Promise<Stripe.Checkout.Session> => {
  const session = await kit.openSession();
  await kit.control('pay', { sessionId: session.id });
  return session;
};
const types = (): string[] => receiver.received.map(({ event }) => event.type);
const inOrder = ['charge.succeeded', 'payment_intent.succeeded', 'checkout.session.completed'];
const told = (count: number) => waitFor(types, (list) => list.length >= count);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const listed = async (delivered: boolean) =>
  (await kit.stripe.events.list({ delivery_success: delivered, limit: 100 })).data;

describe('webhooks', () => {
  it('delivers signed events and notes that they arrived', async () => {
    const session = await pay();
    expect(await told(3)).toEqual(inOrder);
    expect(receiver.forged).toEqual([]);
    const completed = receiver.received[2]?.event;
    expect(completed?.pending_webhooks).toBe(1);
    expect(completed?.account).toBeUndefined();
    expect(completed?.data.object).toMatchObject({ id: session.id, payment_status: 'paid' });
    const arrived = await waitFor(
      () => listed(true),
      (list) => list.length === 3,
    );
    expect(arrived.map((event) => event.pending_webhooks)).toEqual([0, 0, 0]);
    expect(await listed(false)).toEqual([]);
  });

  it('names the account in events of connected accounts', async () => {
    const account = await kit.payee();
    await told(2);
    expect(types()).toEqual(['account.external_account.created', 'account.updated']);
    expect(receiver.received.map(({ event }) => event.account)).toEqual([account.id, account.id]);
  });

  it('names the request and key that caused an event', async () => {
    const charge = await kit.paidCharge();
    await kit.stripe.refunds.create({ charge: charge.id }, { idempotencyKey: 'refund-1' });
    await told(4);
    const created = receiver.received.find(({ event }) => event.type === 'refund.created')?.event;
    expect(created?.request?.idempotency_key).toBe('refund-1');
    expect(created?.request?.id).toMatch(/^req_/);
  });

  it('keeps trying after refusals, without holding up the others', async () => {
    receiver.answers.push(500, 503);
    await pay();
    const list = await told(5);
    expect(list.slice(0, 3)).toEqual(inOrder);
    expect(list.slice(3).sort()).toEqual(['charge.succeeded', 'payment_intent.succeeded']);
    const ids = receiver.received.map(({ event }) => event.id);
    expect([ids.length, new Set(ids).size]).toEqual([5, 3]);
    await waitFor(
      () => listed(false),
      (rest) => rest.length === 0,
    );
  });

  it('holds events until they are flushed', async () => {
    await kit.control('webhooks', { mode: 'hold' });
    await pay();
    await pause(200);
    expect(types()).toEqual([]);
    expect(await listed(false)).toHaveLength(3);
    await kit.control('webhooks/flush');
    expect(await told(3)).toEqual(inOrder);
  });

  it('drops events, which then show as not delivered and can be sent by hand', async () => {
    await kit.control('webhooks', { mode: 'drop' });
    await pay();
    await pause(200);
    expect(types()).toEqual([]);
    const [newest] = await listed(false);
    expect(newest?.type).toBe('checkout.session.completed');
    await kit.control('webhooks/redeliver', { eventId: newest?.id });
    expect(await told(1)).toEqual(['checkout.session.completed']);
  });

  it('duplicates each event with the same id', async () => {
    await kit.control('webhooks', { mode: 'duplicate' });
    await pay();
    await told(6);
    await pause(200);
    const ids = receiver.received.map(({ event }) => event.id);
    expect([ids.length, new Set(ids).size]).toEqual([6, 3]);
  });

  it('tells the same happening again under a new event id', async () => {
    await pay();
    await told(3);
    const first = receiver.received[2]?.event;
    await kit.control('webhooks/redeliver', { eventId: first?.id, asNewEvent: true });
    await told(4);
    const copy = receiver.received[3]?.event;
    expect(copy?.id).not.toBe(first?.id);
    expect(copy?.data.object).toEqual(first?.data.object);
  });

  it('delays events', async () => {
    await kit.control('webhooks', { mode: 'delay', delayMs: 400 });
    await pay();
    await pause(150);
    expect(types()).toEqual([]);
    expect(await told(3)).toEqual(inOrder);
  });

  it('lets events overtake one another', async () => {
    await kit.control('webhooks', { mode: 'shuffle', delayMs: 600 });
    for (let round = 0; round < 4; round += 1) await pay();
    const list = await told(12);
    const straight = [1, 2, 3, 4].flatMap(() => inOrder);
    // Twelve events in their order by chance: less than one in a hundred million.
    expect(list).not.toEqual(straight);
    expect([...list].sort()).toEqual(straight.sort());
  });

  it('signs with real time even when its own clock is ahead', async () => {
    await kit.control('clock', { advanceSeconds: 864_000 });
    await pay();
    await told(3);
    expect(receiver.forged).toEqual([]);
    const stamp = /^t=(\d+),/.exec(receiver.received[0]?.signature ?? '')?.[1] ?? '';
    expect(Math.abs(Number.parseInt(stamp, 10) * 1000 - Date.now())).toBeLessThan(10_000);
  });

  it('expires a session by the clock and says so', async () => {
    const session = await kit.openSession();
    await kit.control('clock', { advanceSeconds: 86_400 });
    expect(await told(1)).toEqual(['checkout.session.expired']);
    const expired = await kit.stripe.checkout.sessions.retrieve(session.id);
    expect(expired.status).toBe('expired');
    const next = await kit.openSession();
    expect(next.status).toBe('open');
  });
});
